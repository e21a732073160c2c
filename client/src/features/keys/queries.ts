import { queryOptions } from '@tanstack/react-query'
import type { PublicKey } from '../../../../shared/schemas/group.ts'
import { api } from '../../lib/api-client.ts'

export const keysQuery = () =>
  queryOptions({ queryKey: ['keys'], queryFn: async ({ signal }) => (await api.get<{ items: PublicKey[] }>('/keys', { signal })).items, staleTime: 60_000 })
