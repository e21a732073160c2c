import { lazy } from 'react'
import { certifiedTruncated } from '../../../../shared/digits.ts'
import { DigitLine } from '../digit-line/digit-line.tsx'
import { Table } from '../ui/table.tsx'
import { ChartFigure } from './chart-figure.tsx'

const ConvergencePlot = lazy(() => import('./convergence-plot.tsx'))

export interface ConvergencePoint {
  /** The cut-off or the number of nodes, as decimal text. */
  at: string
  lo: string
  hi: string
}

interface ConvergenceProps {
  points: ConvergencePoint[]
  /** What `at` counts: "cut-off x" or "nodes". */
  unit: string
}

/** Both ends closing in on where they end up, against the cut-off or the number of nodes. */
export function Convergence({ points, unit }: ConvergenceProps) {
  return (
    <ChartFigure
      caption="How far the upper end lies above, and the lower end below, the middle of the last enclosure; both on logarithmic scales that meet in the middle."
      chart={<ConvergencePlot points={points} unit={unit} />}
      table={
        <Table
          caption="Convergence"
          rows={points}
          rowKey={(point) => point.at}
          columns={[
            { key: 'at', header: unit, align: 'right', cell: (point) => point.at },
            { key: 'digits', header: 'Digits', align: 'right', cell: (point) => certifiedTruncated(point.lo, point.hi).decimals },
            { key: 'value', header: 'Enclosure', cell: (point) => <DigitLine lo={point.lo} hi={point.hi} limit={40} /> },
          ]}
        />
      }
    />
  )
}
