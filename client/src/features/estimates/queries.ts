import { queryOptions } from '@tanstack/react-query'
import type { Estimate } from '../../../../shared/schemas/estimate.ts'
import { api } from '../../lib/api-client.ts'

export const estimateKeys = {
  list: ['estimates'] as const,
  detail: (id: string) => ['estimates', id] as const,
}

/** The whole library: it is short, and the page filters it by itself. */
export const estimatesQuery = () =>
  queryOptions({ queryKey: estimateKeys.list, queryFn: async ({ signal }) => (await api.get<{ items: Estimate[] }>('/estimates', { signal })).items, staleTime: 60_000 })

export const estimateQuery = (id: string) =>
  queryOptions({ queryKey: estimateKeys.detail(id), queryFn: ({ signal }) => api.get<Estimate>(`/estimates/${encodeURIComponent(id)}`, { signal }), staleTime: 60_000 })
