import { useQuery } from '@tanstack/react-query'
import { fetched } from '../../components/ui/fetched.tsx'
import { apiDocumentQuery } from '../../features/programs/queries.ts'
import { ProgramsView } from './programs-view.tsx'

export function ProgramsPage() {
  return <ProgramsView document={fetched(useQuery(apiDocumentQuery()))} />
}
