import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router-dom'
import { constantQuery } from '../../features/constants/queries.ts'
import { useSession } from '../../features/session/queries.ts'
import { ConstantView } from './constant-view.tsx'

export function ConstantPage() {
  const { number = '' } = useParams()
  const constant = useQuery(constantQuery(number))
  const { may } = useSession()
  return <ConstantView number={number} constant={constant.data} error={constant.error} onRetry={() => void constant.refetch()} mayStart={may('research')} />
}
