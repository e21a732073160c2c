import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { Invitation, InvitationInput } from '../../../../shared/schemas/member.ts'
import { api } from '../../lib/api-client.ts'

export const invitationKeys = { all: ['invitations'] as const }

export const invitationsQuery = () =>
  queryOptions({ queryKey: invitationKeys.all, queryFn: async ({ signal }) => (await api.get<{ items: Invitation[] }>('/invitations', { signal })).items })

function useInvalidate() {
  const client = useQueryClient()
  return () => client.invalidateQueries({ queryKey: invitationKeys.all })
}

export function useInvite() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (input: InvitationInput) => api.post<Invitation>('/invitations', input), onSuccess: invalidate })
}

/** Sends the invitation again with a new link; the old one ends. */
export function useResendInvitation() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (id: string) => api.post<Invitation>(`/invitations/${id}/resend`), onSettled: invalidate })
}

export function useRevokeInvitation() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (id: string) => api.delete<void>(`/invitations/${id}`), onSettled: invalidate })
}
