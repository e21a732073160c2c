import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type { InvitationOffer, invitationAcceptance } from '../../../../shared/schemas/member.ts'
import type { passwordResetCompletion, passwordResetInput, passwordResetOffer } from '../../../../shared/schemas/session.ts'
import { api } from '../../lib/api-client.ts'
import { sessionKeys } from '../session/queries.ts'

export type InvitationAcceptance = z.input<typeof invitationAcceptance>
export type PasswordResetInput = z.input<typeof passwordResetInput>
export type PasswordResetOffer = z.infer<typeof passwordResetOffer>
export type PasswordResetCompletion = z.input<typeof passwordResetCompletion>

/** What a mailed link offers is asked for once: it can be used up meanwhile, and then the form's answer says so. */
const once = { staleTime: Infinity, retry: false } as const

export const invitationOfferQuery = (token: string) =>
  queryOptions({ queryKey: ['invitation-offer', token], queryFn: ({ signal }) => api.get<InvitationOffer>(`/invitations/accept/${encodeURIComponent(token)}`, { signal }), ...once })

export const passwordResetOfferQuery = (token: string) =>
  queryOptions({ queryKey: ['password-reset-offer', token], queryFn: ({ signal }) => api.get<PasswordResetOffer>(`/password-resets/${encodeURIComponent(token)}`, { signal }), ...once })

/** Makes the account and signs it in. Whatever was read before was read by somebody else. */
export function useAcceptInvitation(token: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (input: InvitationAcceptance) => api.post<unknown>(`/invitations/accept/${encodeURIComponent(token)}`, input),
    onSuccess: async () => {
      client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKeys.all[0] && queryKey[0] !== 'invitation-offer' })
      await client.refetchQueries({ queryKey: sessionKeys.all })
    },
  })
}

export function useAskPasswordReset() {
  return useMutation({ mutationFn: (input: PasswordResetInput) => api.post<unknown>('/password-resets', input) })
}

/** Sets a new password; the server ends every session, this one included. */
export function useCompletePasswordReset(token: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (input: PasswordResetCompletion) => api.post<void>(`/password-resets/${encodeURIComponent(token)}`, input),
    onSuccess: () => client.invalidateQueries({ queryKey: sessionKeys.all }),
  })
}
