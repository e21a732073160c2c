import { queryOptions } from '@tanstack/react-query'
import type { Desk } from '../../../../shared/schemas/claim.ts'
import { api } from '../../lib/api-client.ts'

export const deskKeys = { all: ['desk'] as const }

export const deskQuery = () => queryOptions({ queryKey: deskKeys.all, queryFn: ({ signal }) => api.get<Desk>('/desk', { signal }) })
