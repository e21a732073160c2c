import type { Query } from '../../lib/api-client.ts'

/** Filters of the audit trail as they stand in the address. Days are in the reader's zone: whoever opens the link sees their own. */
export const AUDIT_FILTERS = ['act', 'actor', 'subjectKind', 'subjectId', 'from', 'to', 'text'] as const
export type AuditFilter = (typeof AUDIT_FILTERS)[number]
export type AuditFilters = Partial<Record<AuditFilter, string>>

export function auditFiltersOf(search: URLSearchParams): AuditFilters {
  return Object.fromEntries(AUDIT_FILTERS.flatMap((name) => (search.get(name) ? [[name, search.get(name)]] : []))) as AuditFilters
}

/** Filters as the API takes them: days as instants, `to` being the first instant that is left out. */
export function auditQueryOf({ from, to, ...rest }: AuditFilters): Query {
  return { ...rest, from: startOfDay(from, 0), to: startOfDay(to, 1) }
}

function startOfDay(day: string | undefined, later: number): string | undefined {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day ?? '')
  if (!match) return undefined
  const date = new Date(Number(match[1]), Number(match[2]) - 1, Number(match[3]) + later)
  return Number.isNaN(date.getTime()) ? undefined : date.toISOString()
}

/** Kinds of what an act is about, with their words. */
export const SUBJECT_KINDS: Record<string, string> = {
  claim: 'claims', constant: 'constants', run: 'runs', member: 'members', group: 'the group', invitation: 'invitations',
  'access-token': 'access tokens', session: 'sessions', estimate: 'estimates', key: 'keys', mail: 'mails', import: 'imports',
}
