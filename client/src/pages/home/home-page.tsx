import { useQuery } from '@tanstack/react-query'
import { Navigate } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { sessionQuery } from '../../features/session/queries.ts'

/** A member begins at the desk, a reader at the register. */
export function HomePage() {
  const { data: session, isPending } = useQuery(sessionQuery())
  if (isPending) return null
  return <Navigate to={session?.member ? paths.desk() : paths.register()} replace />
}
