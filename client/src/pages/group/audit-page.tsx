import { useQuery } from '@tanstack/react-query'
import { useNavigate, useSearchParams } from 'react-router-dom'
import { paths } from '../../app/paths.ts'
import { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { auditFiltersOf, auditQueryOf } from '../../features/audit/audit-filters.ts'
import { auditCheckQuery, auditListQuery } from '../../features/audit/queries.ts'
import { groupQuery } from '../../features/group/queries.ts'
import { membersQuery } from '../../features/members/queries.ts'
import { AuditView } from './audit-view.tsx'

export function AuditPage() {
  const [search] = useSearchParams()
  const navigate = useNavigate()
  const filters = auditFiltersOf(search)
  const query = auditQueryOf(filters)
  const group = useQuery(groupQuery())
  const members = useQuery(membersQuery())
  const list = useQuery(auditListQuery({ ...query, cursor: search.get('cursor') ?? undefined }))
  const check = useQuery(auditCheckQuery())
  const pages = useCursorPages(list.data?.next)
  return (
    <AuditView
      group={group.data}
      list={list.data}
      error={list.error}
      refetching={list.isPlaceholderData}
      onRetry={() => void list.refetch()}
      filters={filters}
      exportSearch={query as Record<string, string | undefined>}
      members={members.data ?? []}
      onFilter={(next) => void navigate(paths.groupAudit(next))}
      pages={pages}
      check={{ result: check.data, error: check.error, checking: check.isFetching, onCheck: () => void check.refetch() }}
    />
  )
}
