import { useQuery } from '@tanstack/react-query'
import { fetched } from '../../components/ui/fetched.tsx'
import { groupQuery } from '../../features/group/queries.ts'
import { keysQuery } from '../../features/keys/queries.ts'
import { GroupKeysView } from './group-keys-view.tsx'

export function GroupKeysPage() {
  const group = useQuery(groupQuery())
  const keys = useQuery(keysQuery())
  return <GroupKeysView group={group.data} keys={fetched(keys)} />
}
