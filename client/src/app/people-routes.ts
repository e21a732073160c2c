import type { QueryClient } from '@tanstack/react-query'
import type { RouteObject } from 'react-router-dom'
import { accountQuery } from '../features/account/queries.ts'
import { auditFiltersOf, auditQueryOf } from '../features/audit/audit-filters.ts'
import { auditListQuery } from '../features/audit/queries.ts'
import { groupQuery } from '../features/group/queries.ts'
import { invitationOfferQuery, passwordResetOfferQuery } from '../features/joining/queries.ts'
import { keysQuery } from '../features/keys/queries.ts'
import { membersQuery } from '../features/members/queries.ts'
import { outboxListQuery } from '../features/outbox/queries.ts'
import type { Prefetch } from './prefetch.ts'
import type { RouteHandle } from './shell.tsx'

const MEMBERS: RouteHandle = { membersOnly: true }

/** Pages about people: joining, one's account, the group. */
export function peopleRoutes(client: QueryClient, prefetch: Prefetch): RouteObject[] {
  const forGroup = (...more: (() => Promise<unknown>)[]) => prefetch(() => Promise.all([client.prefetchQuery(groupQuery()), ...more.map((start) => start())]))
  return [
    {
      path: 'invitations/:token',
      loader: prefetch(({ params }) => client.prefetchQuery(invitationOfferQuery(params.token ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/invitation/invitation-page.tsx')).InvitationPage }),
    },
    { path: 'password-reset', lazy: async () => ({ Component: (await import('../pages/password-reset/ask-reset-page.tsx')).AskResetPage }) },
    {
      path: 'password-reset/:token',
      loader: prefetch(({ params }) => client.prefetchQuery(passwordResetOfferQuery(params.token ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/password-reset/set-password-page.tsx')).SetPasswordPage }),
    },
    {
      path: 'account',
      handle: MEMBERS,
      loader: prefetch(() => client.prefetchQuery(accountQuery())),
      lazy: async () => ({ Component: (await import('../pages/account/account-page.tsx')).AccountPage }),
    },
    {
      path: 'group',
      handle: MEMBERS,
      loader: forGroup(() => client.prefetchQuery(membersQuery())),
      lazy: async () => ({ Component: (await import('../pages/group/group-page.tsx')).GroupPage }),
    },
    { path: 'left', lazy: async () => ({ Component: (await import('../pages/group/left-page.tsx')).LeftPage }) },
    {
      path: 'group/audit',
      handle: MEMBERS,
      loader: prefetch(({ search }) => client.prefetchQuery(auditListQuery({ ...auditQueryOf(auditFiltersOf(search)), cursor: search.get('cursor') ?? undefined }))),
      lazy: async () => ({ Component: (await import('../pages/group/audit-page.tsx')).AuditPage }),
    },
    {
      path: 'group/mail',
      handle: MEMBERS,
      loader: prefetch(({ search }) => client.prefetchQuery(outboxListQuery({ state: search.get('state') ?? undefined, cursor: search.get('cursor') ?? undefined }))),
      lazy: async () => ({ Component: (await import('../pages/group/mail-page.tsx')).MailPage }),
    },
    {
      path: 'group/keys',
      handle: MEMBERS,
      loader: forGroup(() => client.prefetchQuery(keysQuery())),
      lazy: async () => ({ Component: (await import('../pages/group/group-keys-page.tsx')).GroupKeysPage }),
    },
  ]
}
