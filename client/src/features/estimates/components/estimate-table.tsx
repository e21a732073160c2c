import type { Estimate } from '../../../../../shared/schemas/estimate.ts'
import { paths } from '../../../app/paths.ts'
import { Formula } from '../../../components/formula/formula.tsx'
import { Printed } from '../../../components/formula/printed.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { shortTitle } from '../estimate-filters.ts'
import { EstimateState } from './estimate-state.tsx'

/** Estimates with statement, range and what they are conditional on. */
export function EstimateTable({ estimates }: { estimates: Estimate[] }) {
  return (
    <Table
      caption="Estimates"
      rows={estimates}
      rowKey={({ id }) => id}
      columns={[
        { key: 'title', header: 'Estimate', plain: true, className: 'md:w-[24%] print:w-[24%]', cell: ({ id, title }) => <TextLink to={paths.estimate(id)}><Printed text={shortTitle(title)} /></TextLink> },
        { key: 'statement', header: 'Statement', plain: true, cell: ({ statementLatex, statement }) => <Formula latex={statementLatex} text={statement} /> },
        { key: 'range', header: 'Holds for', cell: ({ validFor }) => <Printed text={validFor} /> },
        { key: 'condition', header: 'Conditional', cell: ({ conditional, condition }) => (conditional ? <span className="text-undecided">on {condition ?? 'an unproved hypothesis'}</span> : 'no') },
        { key: 'state', header: 'State', className: 'lg:whitespace-nowrap', cell: (estimate) => <EstimateState estimate={estimate} /> },
        { key: 'used', header: 'Used by', className: 'lg:whitespace-nowrap', cell: ({ uses }) => (uses === 0 ? <span className="text-soft">none</span> : `${uses} signed`) },
      ]}
    />
  )
}
