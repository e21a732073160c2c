import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type { planInput, Plan, Run, RunInput, runPage } from '../../../../shared/schemas/run.ts'
import { api } from '../../lib/api-client.ts'
import type { Query } from '../../lib/api-client.ts'

export type RunPageData = z.infer<typeof runPage>
export type PlanInput = z.input<typeof planInput>

export const runKeys = {
  all: ['runs'] as const,
  list: (query: Query) => ['runs', 'list', query] as const,
  detail: (id: string) => ['runs', id] as const,
  plan: (input: PlanInput | null) => ['plans', input] as const,
}

export const runListQuery = (query: Query) =>
  queryOptions({ queryKey: runKeys.list(query), queryFn: ({ signal }) => api.get<RunPageData>('/runs', { query, signal }), placeholderData: keepPreviousData })

export const runQuery = (id: string) => queryOptions({ queryKey: runKeys.detail(id), queryFn: ({ signal }) => api.get<Run>(`/runs/${id}`, { signal }) })

/** What would be computed. The last answer stays while the next one is asked for; null: the form is not filled in far enough. */
export const planQuery = (input: PlanInput | null) =>
  queryOptions({
    queryKey: runKeys.plan(input),
    queryFn: ({ signal }) => api.post<Plan>('/plans', input, { signal }),
    enabled: input !== null,
    placeholderData: keepPreviousData,
    staleTime: 60_000,
    retry: false,
  })

export function useStartRun() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (input: RunInput) => api.post<Run>('/runs', input),
    onSuccess: () => client.invalidateQueries({ queryKey: runKeys.all }),
  })
}

/** Stops a run, or takes it up again after its last finished part. */
export function useSteerRun(id: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (act: 'stop' | 'resume') => api.post<unknown>(`/runs/${id}/${act}`),
    onSettled: () => client.invalidateQueries({ queryKey: runKeys.detail(id) }),
  })
}
