import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type { Account, accountPatch } from '../../../../shared/schemas/member.ts'
import type { AccessToken, AccessTokenInput, accessTokenCreated, OwnSession, passwordChange } from '../../../../shared/schemas/session.ts'
import { api } from '../../lib/api-client.ts'
import { sessionKeys } from '../session/queries.ts'

export const accountKeys = {
  own: ['account'] as const,
  sessions: ['account', 'sessions'] as const,
  tokens: ['account', 'tokens'] as const,
}

export type AccountPatch = z.input<typeof accountPatch>
export type PasswordChange = z.input<typeof passwordChange>
export type AccessTokenCreated = z.infer<typeof accessTokenCreated>

export const accountQuery = () => queryOptions({ queryKey: accountKeys.own, queryFn: ({ signal }) => api.get<Account>('/account', { signal }) })

export const ownSessionsQuery = () =>
  queryOptions({ queryKey: accountKeys.sessions, queryFn: async ({ signal }) => (await api.get<{ items: OwnSession[] }>('/sessions', { signal })).items })

export const accessTokensQuery = () =>
  queryOptions({ queryKey: accountKeys.tokens, queryFn: async ({ signal }) => (await api.get<{ items: AccessToken[] }>('/access-tokens', { signal })).items })

/** Name and mail preferences; the masthead shows the name, so the session is read again. */
export function useChangeAccount() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (patch: AccountPatch) => api.patch<Account>('/account', patch),
    onSuccess: async (account) => {
      client.setQueryData(accountKeys.own, account)
      await client.invalidateQueries({ queryKey: sessionKeys.all })
    },
  })
}

export function useChangePassword() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (change: PasswordChange) => api.put<void>('/password', change),
    onSuccess: () => client.invalidateQueries({ queryKey: accountKeys.sessions }),
  })
}

/** Ends one's sessions elsewhere, one or several. */
export function useEndSessions() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (ids: string[]) => Promise.all(ids.map((id) => api.delete<void>(`/sessions/${id}`))),
    onSettled: () => client.invalidateQueries({ queryKey: accountKeys.sessions }),
  })
}

export function useCreateAccessToken() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (input: AccessTokenInput) => api.post<AccessTokenCreated>('/access-tokens', input),
    onSuccess: () => client.invalidateQueries({ queryKey: accountKeys.tokens }),
  })
}

export function useRevokeAccessToken() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (id: string) => api.delete<void>(`/access-tokens/${id}`),
    onSettled: () => client.invalidateQueries({ queryKey: accountKeys.tokens }),
  })
}
