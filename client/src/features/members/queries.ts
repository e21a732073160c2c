import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { Role } from '../../../../shared/permissions.ts'
import type { Member } from '../../../../shared/schemas/member.ts'
import { api } from '../../lib/api-client.ts'
import { sessionKeys } from '../session/queries.ts'

export const memberKeys = { all: ['members'] as const }

export const membersQuery = () => queryOptions({ queryKey: memberKeys.all, queryFn: async ({ signal }) => (await api.get<{ items: Member[] }>('/group/members', { signal })).items })

/** Roles may be one's own, and then other pages open or close: the session is read again. */
function useInvalidate() {
  const client = useQueryClient()
  return () => Promise.all([memberKeys.all, sessionKeys.all].map((queryKey) => client.invalidateQueries({ queryKey })))
}

export function useChangeRoles() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: ({ id, roles }: { id: string; roles: Role[] }) => api.patch<Member>(`/group/members/${id}`, { roles }), onSuccess: invalidate })
}

export function useEndMembership() {
  const invalidate = useInvalidate()
  return useMutation({ mutationFn: (id: string) => api.delete<void>(`/group/members/${id}`), onSettled: invalidate })
}

/** Leaving the group oneself ends the session. `forget` drops what was read; call it once the page is one that needs no account. */
export function useLeaveGroup() {
  const client = useQueryClient()
  const leave = useMutation({ mutationFn: (input: { password: string }) => api.post<void>('/group/departure', input) })
  const forget = async () => {
    client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKeys.all[0] })
    await client.refetchQueries({ queryKey: sessionKeys.all })
  }
  return { leave: leave.mutateAsync, forget }
}
