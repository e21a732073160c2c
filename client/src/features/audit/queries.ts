import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import type { z } from 'zod'
import type { AuditCheck, auditPage } from '../../../../shared/schemas/group.ts'
import { api } from '../../lib/api-client.ts'
import type { Query } from '../../lib/api-client.ts'

export type AuditPageData = z.infer<typeof auditPage>

export const auditKeys = {
  list: (query: Query) => ['audit', 'list', query] as const,
  check: ['audit', 'check'] as const,
}

export const auditListQuery = (query: Query) =>
  queryOptions({ queryKey: auditKeys.list(query), queryFn: ({ signal }) => api.get<AuditPageData>('/audit', { query, signal }), placeholderData: keepPreviousData })

/** Recomputes the whole chain on the server, so it is asked for by hand only. */
export const auditCheckQuery = () =>
  queryOptions({ queryKey: auditKeys.check, queryFn: ({ signal }) => api.get<AuditCheck>('/audit/check', { signal }), enabled: false, staleTime: 0, gcTime: 0 })
