import { useQuery } from '@tanstack/react-query'
import { useEffect, useRef, useState } from 'react'
import { useSearchParams } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { claimQuery } from '../../features/claims/queries.ts'
import { constantQuery } from '../../features/constants/queries.ts'
import type { DigitCheckValue } from '../../features/digit-check/components/digit-check.tsx'
import { readSubject } from '../../features/digit-check/subject.ts'
import type { Subject } from '../../features/digit-check/subject.ts'
import { DigitCheckView } from './digit-check-view.tsx'
import type { Against } from './digit-check-view.tsx'

/** Longer pastes stay on the page and out of the address. */
const LONGEST_IN_ADDRESS = 1_500
/** The address follows the typing after a pause, since browsers refuse to change it at every key. */
const PAUSE_MS = 400

export function DigitCheckPage() {
  const [search, setSearch] = useSearchParams()
  const subject = search.get('against') ?? ''
  const [value, setValue] = useState<DigitCheckValue>({ text: search.get('digits') ?? '', reading: search.get('reading') === 'rounded' ? 'rounded' : 'truncated' })
  const against = useAgainst(readSubject(subject))

  const pause = useRef<ReturnType<typeof setTimeout>>(undefined)
  useEffect(() => () => clearTimeout(pause.current), [])
  const show = (next: DigitCheckValue) => {
    setValue(next)
    clearTimeout(pause.current)
    pause.current = setTimeout(() => setSearch((old) => withValue(old, next), { replace: true, preventScrollReset: true }), PAUSE_MS)
  }
  const choose = (text: string) => {
    clearTimeout(pause.current)
    setSearch((old) => {
      const params = withValue(old, value)
      params.set('against', text)
      return params
    })
  }
  return <DigitCheckView subject={subject} against={against} value={value} onSubject={choose} onChange={show} />
}

function withValue(search: URLSearchParams, { text, reading }: DigitCheckValue): URLSearchParams {
  const params = new URLSearchParams(search)
  if (text !== '' && text.length <= LONGEST_IN_ADDRESS) params.set('digits', text)
  else params.delete('digits')
  params.set('reading', reading)
  return params
}

/** Fetches the enclosure of what was named. */
function useAgainst(subject: Subject): Against {
  const constant = useQuery({ ...constantQuery(subject.kind === 'constant' ? subject.number : ''), enabled: subject.kind === 'constant' })
  const claim = useQuery({ ...claimQuery(subject.kind === 'claim' ? subject.number.replace('/', '-') : ''), enabled: subject.kind === 'claim' })

  if (subject.kind === 'none') return { status: 'none' }
  if (subject.kind === 'unreadable') return { status: 'unreadable', reason: subject.reason }
  if (subject.kind === 'interval') return { status: 'ready', lo: subject.lo, hi: subject.hi, of: null }
  const { number } = subject
  const query = subject.kind === 'constant' ? constant : claim
  if (query.error) return { status: 'refused', number, error: query.error, onRetry: () => void query.refetch() }
  if (subject.kind === 'constant' && constant.data) {
    const { best, claims, definition, state } = constant.data
    if (!best) return { status: 'without-enclosure', number, claims: claims.flatMap((each) => (each.number && each.enclosure ? [each.number] : [])) }
    return { status: 'ready', lo: best.lo, hi: best.hi, of: { number, to: paths.constant(number), definition, state } }
  }
  if (subject.kind === 'claim' && claim.data) {
    const { enclosure, definition, state } = claim.data
    if (!enclosure) return { status: 'without-enclosure', number, claims: [] }
    return { status: 'ready', ...enclosure, of: { number, to: paths.claim(number), definition, state } }
  }
  return { status: 'loading', number }
}
