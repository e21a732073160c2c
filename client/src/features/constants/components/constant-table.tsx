import type { ConstantSummary } from '../../../../../shared/schemas/constant.ts'
import { paths } from '../../../app/paths.ts'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { Formula } from '../../../components/formula/formula.tsx'
import { StateMark } from '../../../components/state-mark/state-mark.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Table } from '../../../components/ui/table.tsx'
import type { Column, Sorting } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'

/** Columns for which a window of half a screen has no room; the constant's own page has them. */
const HALF_WIDTH = 'md:max-wide:hidden print:table-cell'

const COLUMNS: Column<ConstantSummary>[] = [
  { key: 'number', header: 'Number', sortable: true, plain: true, cell: (row) => <TextLink to={paths.constant(row.number)} className="whitespace-nowrap">{row.number}</TextLink> },
  { key: 'k', header: 'Definition', sortable: true, plain: true, cell: (row) => <Formula latex={row.definition.latex} text={row.definition.text} /> },
  { key: 'value', header: 'Best enclosure', sortable: true, plain: true, cell: (row) => (row.best ? <DigitLine lo={row.best.lo} hi={row.best.hi} limit={50} /> : <span className="text-soft italic">none in force</span>) },
  { key: 'digits', header: 'Digits', sortable: true, align: 'right', cell: (row) => row.best?.digits.truncated ?? '' },
  {
    key: 'state',
    header: 'State',
    cell: (row) => (
      <>
        <StateMark state={row.state} />
        {row.inConflict && <span className="block text-refused">in conflict</span>}
      </>
    ),
  },
  { key: 'group', header: 'Group', className: HALF_WIDTH, cell: (row) => row.group.name },
  { key: 'changed', header: 'Changed', sortable: true, className: HALF_WIDTH, cell: (row) => <Time at={row.changedAt} /> },
]

interface ConstantTableProps {
  rows: ConstantSummary[]
  sorting: Sorting
  onTurn: (direction: 'previous' | 'next') => void
  busy: boolean
}

export function ConstantTable({ rows, sorting, onTurn, busy }: ConstantTableProps) {
  return <Table caption="Constants of the register" columns={COLUMNS} rows={rows} rowKey={(row) => row.number} sorting={sorting} onTurn={onTurn} busy={busy} />
}
