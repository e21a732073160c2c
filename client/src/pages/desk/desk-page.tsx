import { useQuery } from '@tanstack/react-query'
import { deskQuery } from '../../features/desk/queries.ts'
import { useSession } from '../../features/session/queries.ts'
import { DeskView } from './desk-view.tsx'

export function DeskPage() {
  const desk = useQuery({ ...deskQuery(), refetchInterval: 60_000 })
  const { member } = useSession()
  return <DeskView desk={desk.data} error={desk.error} onRetry={() => void desk.refetch()} roles={member?.roles ?? []} />
}
