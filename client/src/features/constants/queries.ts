import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import type { z } from 'zod'
import type { Constant, constantPage } from '../../../../shared/schemas/constant.ts'
import { api } from '../../lib/api-client.ts'
import type { Query } from '../../lib/api-client.ts'

export type ConstantPageData = z.infer<typeof constantPage>

export const constantKeys = {
  all: ['constants'] as const,
  list: (query: Query) => ['constants', 'list', query] as const,
  detail: (number: string) => ['constants', number] as const,
}

/** A page of the register; the page before stays on the screen while the next one is read. */
export const constantListQuery = (query: Query) =>
  queryOptions({ queryKey: constantKeys.list(query), queryFn: ({ signal }) => api.get<ConstantPageData>('/constants', { query, signal }), placeholderData: keepPreviousData })

export const constantQuery = (number: string) =>
  queryOptions({ queryKey: constantKeys.detail(number), queryFn: ({ signal }) => api.get<Constant>(`/constants/${number}`, { signal }) })
