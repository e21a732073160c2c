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
import { routeOf } from './route-of.ts'

/** Pages about people: joining, one's account, the group. */
export function peopleRoutes(client: QueryClient, prefetch: Prefetch): RouteObject[] {
  const forGroup = (...more: (() => Promise<unknown>)[]) => prefetch(() => Promise.all([client.prefetchQuery(groupQuery()), ...more.map((start) => start())]))
  return [
    {
      ...routeOf('invitation'),
      loader: prefetch(({ params }) => client.prefetchQuery(invitationOfferQuery(params.token ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/invitation/invitation-page.tsx')).InvitationPage }),
    },
    { ...routeOf('forgotPassword'), lazy: async () => ({ Component: (await import('../pages/password-reset/ask-reset-page.tsx')).AskResetPage }) },
    {
      ...routeOf('passwordReset'),
      loader: prefetch(({ params }) => client.prefetchQuery(passwordResetOfferQuery(params.token ?? ''))),
      lazy: async () => ({ Component: (await import('../pages/password-reset/set-password-page.tsx')).SetPasswordPage }),
    },
    {
      ...routeOf('account'),
      loader: prefetch(() => client.prefetchQuery(accountQuery())),
      lazy: async () => ({ Component: (await import('../pages/account/account-page.tsx')).AccountPage }),
    },
    {
      ...routeOf('group'),
      loader: forGroup(() => client.prefetchQuery(membersQuery())),
      lazy: async () => ({ Component: (await import('../pages/group/group-page.tsx')).GroupPage }),
    },
    { ...routeOf('groupLeft'), lazy: async () => ({ Component: (await import('../pages/group/left-page.tsx')).LeftPage }) },
    {
      ...routeOf('groupAudit'),
      loader: prefetch(({ search }) => client.prefetchQuery(auditListQuery({ ...auditQueryOf(auditFiltersOf(search)), cursor: search.get('cursor') ?? undefined }))),
      lazy: async () => ({ Component: (await import('../pages/group/audit-page.tsx')).AuditPage }),
    },
    {
      ...routeOf('groupMail'),
      loader: prefetch(({ search }) => client.prefetchQuery(outboxListQuery({ state: search.get('state') ?? undefined, cursor: search.get('cursor') ?? undefined }))),
      lazy: async () => ({ Component: (await import('../pages/group/mail-page.tsx')).MailPage }),
    },
    {
      ...routeOf('groupKeys'),
      loader: forGroup(() => client.prefetchQuery(keysQuery())),
      lazy: async () => ({ Component: (await import('../pages/group/group-keys-page.tsx')).GroupKeysPage }),
    },
  ]
}
