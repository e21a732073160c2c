import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import type { z } from 'zod'
import type { lookUpInput, lookUpResult } from '../../../../shared/schemas/constant.ts'
import { api } from '../../lib/api-client.ts'

export type LookUpInput = z.infer<typeof lookUpInput>
export type LookUpItem = z.infer<typeof lookUpResult>['items'][number]

/** Constants beside some digits. Null: nothing to look up yet. */
export const lookUpQuery = (input: LookUpInput | null) =>
  queryOptions({
    queryKey: ['look-up', input],
    queryFn: async ({ signal }) => (await api.post<{ items: LookUpItem[] }>('/look-ups', input, { signal })).items,
    enabled: input !== null,
    placeholderData: keepPreviousData,
    staleTime: 30_000,
    retry: false,
  })
