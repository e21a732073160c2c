import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import { act } from '../../../../shared/schemas/claim.ts'
import type { Act, Claim, ClaimInput } from '../../../../shared/schemas/claim.ts'
import { api } from '../../lib/api-client.ts'
import { constantKeys } from '../constants/queries.ts'
import { deskKeys } from '../desk/queries.ts'
import { runKeys } from '../runs/queries.ts'
import { sessionKeys } from '../session/queries.ts'

export const claimKeys = {
  all: ['claims'] as const,
  detail: (id: string) => ['claims', id] as const,
}

/** A claim by its id or by its number in an address (MST-0042-1). While a recheck works it is read again every few seconds. */
export const claimQuery = (id: string) =>
  queryOptions({
    queryKey: claimKeys.detail(id),
    queryFn: ({ signal }) => api.get<Claim>(`/claims/${id}`, { signal }),
    refetchInterval: (query) => (query.state.data?.rechecks.some((recheck) => recheck.state === 'queued' || recheck.state === 'running') ? 2_000 : false),
  })

/** After an act everything that shows the claim, or what waits for somebody, is read again. */
function useInvalidate() {
  const client = useQueryClient()
  return () => Promise.all([claimKeys.all, constantKeys.all, deskKeys.all, runKeys.all, sessionKeys.all].map((queryKey) => client.invalidateQueries({ queryKey })))
}

export function useDraftClaim() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (input: ClaimInput) => api.post<Claim>('/claims', input), onSuccess: invalidate })
}

export type ActInput<Name extends Act> = z.input<(typeof act)[Name]>
/** Carries out an act and comes back when everything shown is up to date; throws what the server refuses. */
export type DoAct = <Name extends Act>(name: Name, input: ActInput<Name>) => Promise<void>

/** Acts on a claim. After a refusal, too, the claim is read again: somebody else may have been quicker. */
export function useActs(claimId: string): DoAct {
  const invalidate = useInvalidate()
  const mutation = useMutation({ mutationFn: ({ name, input }: { name: Act; input: unknown }) => api.post<unknown>(`/claims/${claimId}/${name}`, input), onSettled: invalidate })
  return async (name, input) => {
    await mutation.mutateAsync({ name, input })
  }
}

export function useEditClaim(claimId: string) {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (patch: { version: number; remark?: string; source?: string }) => api.patch<unknown>(`/claims/${claimId}`, patch), onSettled: invalidate })
}

export function useDeleteClaim(claimId: string) {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: () => api.delete(`/claims/${claimId}`), onSuccess: invalidate })
}

export function useUploadEvidence(claimId: string) {
  const invalidate = useInvalidate()
  return useMutation({
    mutationFn: (file: File) => {
      const form = new FormData()
      form.append('file', file)
      return api.upload<unknown>(`/claims/${claimId}/evidence`, form)
    },
    onSettled: invalidate,
  })
}

export function useRemoveEvidence() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (evidenceId: string) => api.delete(`/evidence/${evidenceId}`), onSettled: invalidate })
}

/** The referee's private draft of a verdict, kept while typing. */
export function useKeepVerdictDraft(claimId: string) {
  return useMutation({ mutationFn: (text: string) => api.put<unknown>(`/claims/${claimId}/verdict-draft`, { text }) })
}
