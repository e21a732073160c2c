import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type { Group, groupPatch } from '../../../../shared/schemas/group.ts'
import { api } from '../../lib/api-client.ts'

export type GroupPatch = z.input<typeof groupPatch>

export const groupKeys = { own: ['group'] as const }

export const groupQuery = () => queryOptions({ queryKey: groupKeys.own, queryFn: ({ signal }) => api.get<Group>('/group', { signal }) })

/** The rules decide what a claim still needs, so whatever shows claims is read again. */
export function useChangeRules() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (patch: GroupPatch) => api.patch<Group>('/group', patch),
    onSuccess: (group) => {
      client.setQueryData(groupKeys.own, group)
      return client.invalidateQueries({ predicate: ({ queryKey }) => ['claims', 'desk', 'audit'].includes(String(queryKey[0])) })
    },
  })
}
