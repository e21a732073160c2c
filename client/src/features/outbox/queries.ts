import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type { OutboxItem, outboxPage } from '../../../../shared/schemas/group.ts'
import { api } from '../../lib/api-client.ts'
import type { Query } from '../../lib/api-client.ts'

export type OutboxPageData = z.infer<typeof outboxPage>

export const outboxKeys = {
  all: ['outbox'] as const,
  list: (query: Query) => ['outbox', 'list', query] as const,
}

const UNDER_WAY = new Set<OutboxItem['state']>(['waiting', 'sending'])

/** A page of the mails; while one of them is on its way it is read again every few seconds. */
export const outboxListQuery = (query: Query) =>
  queryOptions({
    queryKey: outboxKeys.list(query),
    queryFn: ({ signal }) => api.get<OutboxPageData>('/outbox', { query, signal }),
    placeholderData: keepPreviousData,
    refetchInterval: ({ state }) => (state.data?.items.some((item) => UNDER_WAY.has(item.state)) ? 5_000 : false),
  })

/** Sends a mail once more, as a mail of its own. */
export function useResendMail() {
  const client = useQueryClient()
  return useMutation({ mutationFn: (id: string) => api.post<OutboxItem>(`/outbox/${id}/resend`), onSettled: () => client.invalidateQueries({ queryKey: outboxKeys.all }) })
}
