import { pageHead } from '../../../../shared/page-head.ts'
import { files, paths } from '../../app/paths.ts'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { FileLink } from '../../components/ui/link.tsx'
import { MarginNote, Page } from '../../components/ui/page.tsx'
import { Pagination } from '../../components/ui/pagination.tsx'
import type { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { AuditFiltersForm } from '../../features/audit/components/audit-filters-form.tsx'
import { AuditTable } from '../../features/audit/components/audit-table.tsx'
import { ChainCheck } from '../../features/audit/components/chain-check.tsx'
import type { AuditFilters } from '../../features/audit/audit-filters.ts'
import type { AuditPageData } from '../../features/audit/queries.ts'
import { GroupHead } from '../../features/group/components/group-head.tsx'
import type { AuditCheck, Group } from '../../../../shared/schemas/group.ts'
import type { Member } from '../../../../shared/schemas/member.ts'

interface AuditViewProps {
  group: Group | undefined
  list: AuditPageData | undefined
  error: unknown
  refetching: boolean
  onRetry: () => void
  filters: AuditFilters
  /** The same filters as the API takes them, for the files. */
  exportSearch: Record<string, string | undefined>
  members: Member[]
  onFilter: (filters: AuditFilters) => void
  pages: ReturnType<typeof useCursorPages>
  check: { result: AuditCheck | undefined; error: unknown; checking: boolean; onCheck: () => void }
}

/** What was done in the group, by whom and when. */
export function AuditView({ group, list, error, refetching, onRetry, filters, exportSearch, members, onFilter, pages, check }: AuditViewProps) {
  const filtered = Object.keys(filters).length > 0
  return (
    <Page
      about={pageHead('groupAudit')}
      head={<GroupHead group={group} />}
      margin={
        <>
          <MarginNote title="The chain">
            <ChainCheck {...check} />
          </MarginNote>
          <MarginNote title="Take it along">
            <p>
              {filtered ? 'What the filters show' : 'The whole trail of the group'}, as <FileLink href={files.auditExport({ ...exportSearch, format: 'csv' })}>CSV</FileLink> or{' '}
              <FileLink href={files.auditExport({ ...exportSearch, format: 'jsonl' })}>JSON lines</FileLink>.
            </p>
          </MarginNote>
        </>
      }
    >
      <AuditFiltersForm filters={filters} members={members} onFilter={onFilter} clearTo={filtered ? paths.groupAudit() : null} />
      {error && !list ? (
        <ErrorView title="The audit trail could not be read" error={error} onRetry={onRetry} />
      ) : !list ? (
        <Loading what="Reading the audit trail" />
      ) : list.items.length === 0 ? (
        <Empty title={filtered ? 'No entry fits these filters.' : 'Nothing has been done yet.'}>
          <p>{filtered ? 'Try fewer filters, or a longer time.' : 'Every act on claims, runs, members and rules is written here as it happens, and stays.'}</p>
        </Empty>
      ) : (
        <>
          <AuditTable entries={list.items} onTurn={pages.turn} busy={refetching} />
          <Pagination shown={list.items.length} total={list.total} unit={list.items.length === 1 ? 'entry' : 'entries'} previous={pages.previous} next={pages.next} />
        </>
      )}
    </Page>
  )
}
