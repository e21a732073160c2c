import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import type { Right } from '../../../../shared/permissions.ts'
import type { Session, SignInInput } from '../../../../shared/schemas/session.ts'
import { api } from '../../lib/api-client.ts'

export const sessionKeys = { all: ['session'] as const }

/** Who is reading, what they may do, and what waits for them. */
export const sessionQuery = () => queryOptions({ queryKey: sessionKeys.all, queryFn: ({ signal }) => api.get<Session>('/session', { signal }), staleTime: 60_000 })

/** The session with the question whether the reader has a right; undefined while it isn't known. */
export function useSession(): { member: Session['member'] | undefined; may: (right: Right) => boolean } {
  const { data } = useQuery(sessionQuery())
  return { member: data?.member, may: (right) => data?.member?.rights.includes(right) ?? false }
}

/** Signing in or out changes what every page may show, so nothing that was read before is kept. */
export function useSignIn() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (input: SignInInput) => api.post<unknown>('/session', input),
    onSuccess: async () => {
      client.removeQueries({ predicate: (query) => query.queryKey[0] !== sessionKeys.all[0] })
      await client.refetchQueries({ queryKey: sessionKeys.all })
    },
  })
}

export function useSignOut() {
  const client = useQueryClient()
  return useMutation({ mutationFn: () => api.delete('/session'), onSettled: () => client.resetQueries() })
}
