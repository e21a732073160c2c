import { lazy, Suspense } from 'react'
import type { ErrorSource } from '../../../../shared/engine/methods/computation.ts'
import { SOURCE_WORDS } from '../../../../shared/words.ts'
import { Printed } from '../formula/printed.tsx'
import { Table } from '../ui/table.tsx'
import { Power } from './power.tsx'

const ErrorBudgetPlot = lazy(() => import('./error-budget-plot.tsx'))

export interface BudgetLine {
  source: ErrorSource
  /** Id of the bound. */
  bound: string
  /** Name of the bound and what it claims. */
  statement: string
  /** Contribution to the radius, rounded up: "3.1e-42". */
  magnitude: string
}

/** "3.1e-42" as it is printed. */
export function Magnitude({ text }: { text: string }) {
  const [mantissa, exponent] = text.toLowerCase().split('e')
  return exponent && Number(exponent) !== 0 ? <Power factor={mantissa ?? ''} exponent={Number(exponent)} /> : <span className="whitespace-nowrap">{mantissa}</span>
}

/** What a bound says, its name before the colon; on paper the name alone, which with the id finds the rest. */
function Statement({ text }: { text: string }) {
  const [name = '', ...rest] = text.split(': ')
  return (
    <>
      <Printed text={name} />
      {rest.length > 0 && <span className="print:hidden">: <Printed text={rest.join(': ')} /></span>}
    </>
  )
}

interface ErrorBudgetProps {
  items: BudgetLine[]
  /** Half the width of the enclosure, rounded up. */
  radius: string
}

/** How much of the radius each source brings: as bars, and below them the same numbers with the statement of each bound. */
export function ErrorBudget({ items, radius }: ErrorBudgetProps) {
  return (
    <>
      <figure className="mb-5 print:hidden" aria-hidden="true">
        <Suspense fallback={<div style={{ height: 92 + 34 * items.length }} />}>
          <ErrorBudgetPlot items={items} radius={radius} />
        </Suspense>
      </figure>
      <BudgetTable items={items} radius={radius} />
    </>
  )
}

function BudgetTable({ items, radius }: ErrorBudgetProps) {
  const rows = [...items.map((item, index) => ({ key: String(index), ...item })), { key: 'radius', source: null, bound: '', statement: 'Half the width of the enclosure', magnitude: radius }]
  return (
    <Table
      caption="Error budget"
      rows={rows}
      rowKey={(row) => row.key}
      columns={[
        { key: 'source', header: 'Source', cell: (row) => (row.source ? SOURCE_WORDS[row.source] : <strong className="font-semibold">Radius</strong>) },
        { key: 'magnitude', header: 'At most', align: 'right', cell: (row) => <Magnitude text={row.magnitude} /> },
        { key: 'bound', header: 'Bound', cell: (row) => row.bound && <code className="whitespace-nowrap">{row.bound}</code> },
        { key: 'statement', header: 'What the bound says', cell: (row) => <Statement text={row.statement} /> },
      ]}
    />
  )
}
