import { pageHead } from '../../../../shared/page-head.ts'
import type { RunSummary } from '../../../../shared/schemas/run.ts'
import { goalText } from '../../../../shared/engine/methods/goal.ts'
import { METHOD_WORDS } from '../../../../shared/words.ts'
import { paths } from '../../app/paths.ts'
import { Formula } from '../../components/formula/formula.tsx'
import { Printed } from '../../components/formula/printed.tsx'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { Choice, Field, Options, Select } from '../../components/ui/field.tsx'
import { ButtonLink, TextLink } from '../../components/ui/link.tsx'
import { Page } from '../../components/ui/page.tsx'
import { Pagination } from '../../components/ui/pagination.tsx'
import { Table } from '../../components/ui/table.tsx'
import type { Column } from '../../components/ui/table.tsx'
import { Time } from '../../components/ui/time.tsx'
import type { useCursorPages } from '../../components/ui/use-cursor-pages.ts'
import type { RunPageData } from '../../features/runs/queries.ts'
import { RUN_STATE_WORDS } from '../../features/runs/run-words.ts'

export interface RunsViewProps {
  list: RunPageData | undefined
  error: unknown
  refetching: boolean
  onRetry: () => void
  state: string
  mine: boolean
  onFilter: (state: string, mine: boolean) => void
  pages: ReturnType<typeof useCursorPages>
  mayStart: boolean
}

const COLUMNS: Column<RunSummary>[] = [
  { key: 'definition', header: 'Constant', plain: true, cell: (run) => <><TextLink to={paths.run(run.id)} className="whitespace-nowrap">{run.constant}</TextLink> {run.purpose === 'recheck' && <span className="text-soft">recheck{run.claimNumber ? ` of ${run.claimNumber}` : ''}</span>}</> },
  { key: 'formula', header: 'Definition', plain: true, cell: (run) => <Formula latex={run.definition.latex} text={run.definition.text} /> },
  { key: 'goal', header: 'Goal', cell: (run) => <Printed text={goalText(run.goal)} /> },
  { key: 'method', header: 'Method', cell: (run) => `${METHOD_WORDS[run.method]}, ${run.arithmetic}` },
  { key: 'state', header: 'State', cell: (run) => (run.state === 'running' ? `${RUN_STATE_WORDS.running}, ${Math.floor(run.progress * 100)} %` : RUN_STATE_WORDS[run.state]) },
  { key: 'digits', header: 'Digits', align: 'right', cell: (run) => run.digits?.truncated ?? '' },
  { key: 'by', header: 'Started', cell: (run) => <>{run.startedBy.name}, <Time at={run.createdAt} /></> },
]

export function RunsView({ list, error, refetching, onRetry, state, mine, onFilter, pages, mayStart }: RunsViewProps) {
  const filtered = state !== '' || mine
  return (
    <Page
      about={pageHead('runs')}
      head={
        <div className="flex flex-wrap items-end justify-between gap-4">
          <h1>Runs</h1>
          {mayStart && (
            <ButtonLink to={paths.newRun()} tone="act">
              New run
            </ButtonLink>
          )}
        </div>
      }
    >
      <div className="mb-5 flex flex-wrap items-end gap-6">
        <Field label="State" className="w-40">
          {(control) => (
            <Select {...control} value={state} onChange={(event) => onFilter(event.target.value, mine)}>
              <option value="">any</option>
              <Options of={RUN_STATE_WORDS} />
            </Select>
          )}
        </Field>
        <Choice label="only mine" className="pb-2" checked={mine} onChange={(event) => onFilter(state, event.target.checked)} />
      </div>
      {error && !list ? (
        <ErrorView title="The runs could not be read" error={error} onRetry={onRetry} />
      ) : !list ? (
        <Loading what="Reading the runs" />
      ) : list.items.length === 0 ? (
        <Empty title={filtered ? 'No run fits this filter.' : 'No run yet.'}>
          {!filtered && <p>A run encloses a constant in interval arithmetic: say what is summed and how many digits you want.</p>}
          {!filtered && mayStart && (
            <ButtonLink to={paths.newRun()} tone="act">
              Start the first
            </ButtonLink>
          )}
        </Empty>
      ) : (
        <>
          <Table caption="Runs" columns={COLUMNS} rows={list.items} rowKey={(run) => run.id} onTurn={pages.turn} busy={refetching} />
          <Pagination shown={list.items.length} total={list.total} unit={list.items.length === 1 ? 'run' : 'runs'} previous={pages.previous} next={pages.next} />
        </>
      )}
    </Page>
  )
}
