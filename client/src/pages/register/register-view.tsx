import { pageHead } from '../../../../shared/page-head.ts'
import { files, paths } from '../../app/paths.ts'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { ButtonLink, FileLink, TextLink } from '../../components/ui/link.tsx'
import { Page } from '../../components/ui/page.tsx'
import { Pagination } from '../../components/ui/pagination.tsx'
import type { Sorting } from '../../components/ui/table.tsx'
import type { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import { ConstantTable } from '../../features/constants/components/constant-table.tsx'
import { RegisterFiltersForm } from '../../features/constants/components/register-filters-form.tsx'
import type { ConstantPageData } from '../../features/constants/queries.ts'
import type { RegisterFilter } from '../../features/constants/register-filters.ts'
import type { Query } from '../../lib/api-client.ts'
import { fieldProblem, problemOf } from '../../lib/errors.ts'

export interface RegisterViewProps {
  list: ConstantPageData | undefined
  error: unknown
  refetching: boolean
  onRetry: () => void
  filters: Query
  filtered: boolean
  onFilter: (filters: Partial<Record<RegisterFilter, string>>) => void
  sorting: Sorting
  pages: ReturnType<typeof useCursorPages>
  /** This reader may start runs. */
  mayStart: boolean
}

export function RegisterView({ list, error, refetching, onRetry, filters, filtered, onFilter, sorting, pages, mayStart }: RegisterViewProps) {
  return (
    <Page
      about={pageHead('register')}
      head={
        <div className="flex flex-wrap items-end justify-between gap-4">
          <h1>Register of constants</h1>
          {mayStart && <ButtonLink to={paths.newRun()}>New run</ButtonLink>}
        </div>
      }
    >
      <RegisterFiltersForm filters={filters} onFilter={onFilter} clearTo={filtered ? paths.register() : null} errorAt={(filter) => fieldProblem(error, filter)} />
      {error && !list ? (
        <ErrorView title={filtered && !problemOf(error).passing ? 'These filters can’t be used' : 'The register could not be read'} error={error} onRetry={onRetry} />
      ) : !list ? (
        <Loading what="Reading the register" />
      ) : list.items.length === 0 ? (
        <EmptyRegister filtered={filtered} mayStart={mayStart} />
      ) : (
        <>
          <ConstantTable rows={list.items} sorting={sorting} onTurn={pages.turn} busy={refetching} />
          <Pagination shown={list.items.length} total={list.total} unit={list.items.length === 1 ? 'constant' : 'constants'} previous={pages.previous} next={pages.next} />
          <p className="mt-4 text-[0.92rem] text-soft print:hidden">
            Take these along as{' '}
            {(['csv', 'json', 'bibtex', 'latex'] as const).map((format, index) => (
              <span key={format}>
                {index > 0 && ', '}
                <FileLink href={files.constantExport({ ...(filters as Record<string, string>), format })}>{EXPORT_WORDS[format]}</FileLink>
              </span>
            ))}
            . Digits are rounded outward.
          </p>
        </>
      )}
    </Page>
  )
}

const EXPORT_WORDS = { csv: 'CSV', json: 'JSON', bibtex: 'BibTeX', latex: 'a LaTeX table' }

function EmptyRegister({ filtered, mayStart }: { filtered: boolean; mayStart: boolean }) {
  if (filtered)
    return (
      <Empty title="No constant fits these filters.">
        <p>
          Digits are looked up as leading digits, so 1.6366 finds what begins with 1.6366. Try fewer filters, or <TextLink to={paths.lookUp()}>look up the digits</TextLink> to see what is near them.
        </p>
      </Empty>
    )
  return (
    <Empty title="The register is empty.">
      <p>Here stand the constants that the groups of this installation have stated, each with its best signed enclosure.</p>
      {mayStart && (
        <ButtonLink to={paths.newRun()} tone="act">
          Begin with a run
        </ButtonLink>
      )}
    </Empty>
  )
}
