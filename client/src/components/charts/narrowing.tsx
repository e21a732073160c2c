import { lazy } from 'react'
import { DigitLine } from '../digit-line/digit-line.tsx'
import { Table } from '../ui/table.tsx'
import { Time } from '../ui/time.tsx'
import { ChartFigure } from './chart-figure.tsx'

const NarrowingPlot = lazy(() => import('./narrowing-plot.tsx'))

export interface NarrowingStep {
  at: string
  lo: string
  hi: string
  digits: number
  claim: string
  author: string
}

/** Certified digits of the best enclosure over time, each signed claim a step. */
export function Narrowing({ steps }: { steps: NarrowingStep[] }) {
  return (
    <ChartFigure
      caption="Certified digits of the best enclosure after each signature."
      chart={<NarrowingPlot steps={steps} />}
      table={
        <Table
          caption="How the enclosure narrowed"
          rows={steps}
          rowKey={(step) => step.claim}
          columns={[
            { key: 'at', header: 'Signed', cell: (step) => <Time at={step.at} /> },
            { key: 'claim', header: 'Claim', cell: (step) => step.claim },
            { key: 'author', header: 'Author', cell: (step) => step.author },
            { key: 'digits', header: 'Digits', align: 'right', cell: (step) => step.digits },
            { key: 'value', header: 'Best enclosure', cell: (step) => <DigitLine lo={step.lo} hi={step.hi} limit={50} /> },
          ]}
        />
      }
    />
  )
}
