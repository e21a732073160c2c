import { useQuery } from '@tanstack/react-query'
import { fetched } from '../../components/ui/fetched.tsx'
import { keysQuery } from '../../features/keys/queries.ts'
import { KeysView } from './keys-view.tsx'

export function KeysPage() {
  return <KeysView keys={fetched(useQuery(keysQuery()))} />
}
