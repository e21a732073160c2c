import { useQuery } from '@tanstack/react-query'
import { useNavigate, useSearchParams } from 'react-router-dom'
import { readDigits } from '../../../../shared/digit-reading.ts'
import type { PrintedAs } from '../../../../shared/digit-check.ts'
import { paths } from '../../app/paths.ts'
import { fetched } from '../../components/ui/fetched.tsx'
import { lookUpQuery } from '../../features/look-up/queries.ts'
import { LookUpView } from './look-up-view.tsx'

export function LookUpPage() {
  const [search] = useSearchParams()
  const navigate = useNavigate()
  const digits = search.get('digits') ?? ''
  const reading: PrintedAs = search.get('reading') === 'rounded' ? 'rounded' : 'truncated'
  const read = digits.trim() === '' ? null : readDigits(digits)
  const found = useQuery(lookUpQuery(read?.ok ? { text: digits, reading } : null))
  return (
    <LookUpView
      digits={digits}
      reading={reading}
      found={read?.ok ? fetched(found) : null}
      unreadable={read && !read.ok ? read.reason : null}
      busy={found.isFetching}
      onLookUp={(text, as) => void navigate(paths.lookUp({ digits: text.trim(), reading: as === 'rounded' ? as : undefined }))}
    />
  )
}
