import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type { doubtInput, Estimate, EstimateDoubt, liftInput, LiftResult } from '../../../../shared/schemas/estimate.ts'
import type { Run, RunInput } from '../../../../shared/schemas/run.ts'
import { api } from '../../lib/api-client.ts'
import { claimKeys } from '../claims/queries.ts'
import { constantKeys } from '../constants/queries.ts'
import { deskKeys } from '../desk/queries.ts'
import { runKeys } from '../runs/queries.ts'
import { sessionKeys } from '../session/queries.ts'

export const estimateKeys = {
  list: ['estimates'] as const,
  detail: (id: string) => ['estimates', id] as const,
  doubt: (id: string) => ['estimates', id, 'doubt'] as const,
}

/** The whole library: it is short, and the page filters it by itself. */
export const estimatesQuery = () =>
  queryOptions({ queryKey: estimateKeys.list, queryFn: async ({ signal }) => (await api.get<{ items: Estimate[] }>('/estimates', { signal })).items, staleTime: 60_000 })

export const estimateQuery = (id: string) =>
  queryOptions({ queryKey: estimateKeys.detail(id), queryFn: ({ signal }) => api.get<Estimate>(`/estimates/${encodeURIComponent(id)}`, { signal }), staleTime: 60_000 })

const addressOf = (id: string): string => `/estimates/${encodeURIComponent(id)}/doubt`

/** All that rests on an estimate in the lead's group, as it is at this moment. While runs without it work it is read again every few seconds. */
export const doubtQuery = (id: string) =>
  queryOptions({
    queryKey: estimateKeys.doubt(id),
    queryFn: ({ signal }) => api.get<EstimateDoubt>(addressOf(id), { signal }),
    staleTime: 0,
    refetchInterval: (query) => (query.state.data?.again.some(({ run }) => run?.state === 'queued' || run?.state === 'running') ? 2_000 : false),
  })

export type MarkInput = z.input<typeof doubtInput>
export type LiftInput = z.input<typeof liftInput>

/** Marks an estimate as in doubt or lifts the doubt. What both change is read again, also after a refusal: somebody may have been quicker. */
export function useDoubt(id: string) {
  const client = useQueryClient()
  const onSettled = () =>
    Promise.all([estimateKeys.list, claimKeys.all, constantKeys.all, deskKeys.all, sessionKeys.all, ['plans']].map((queryKey) => client.invalidateQueries({ queryKey })))
  const mark = useMutation({ mutationFn: (input: MarkInput) => api.post<EstimateDoubt>(addressOf(id), input), onSettled })
  const lift = useMutation({ mutationFn: (input: LiftInput) => api.post<LiftResult>(`${addressOf(id)}/lift`, input), onSettled })
  return { mark: mark.mutateAsync, lift: lift.mutateAsync }
}

/** Starts a run of a constant without what the group has in doubt; the server leaves that out by itself. */
export function useRunAgain(id: string) {
  const client = useQueryClient()
  const start = useMutation({
    mutationFn: ({ definition, goal }: EstimateDoubt['again'][number]) => api.post<Run>('/runs', { definition: definition.canonical, goal, method: 'auto' } as RunInput),
    onSettled: () => Promise.all([estimateKeys.doubt(id), runKeys.all].map((queryKey) => client.invalidateQueries({ queryKey }))),
  })
  return start.mutateAsync
}
