import { pageHead } from '../../../../shared/page-head.ts'
import type { Estimate } from '../../../../shared/schemas/estimate.ts'
import { paths } from '../../app/paths.ts'
import { Empty } from '../../components/ui/feedback.tsx'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { Field, Options, Select, TextInput } from '../../components/ui/field.tsx'
import { FilterButtons, FilterForm } from '../../components/ui/filter-form.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Page } from '../../components/ui/page.tsx'
import { EstimateTable } from '../../features/estimates/components/estimate-table.tsx'
import { filterEstimates } from '../../features/estimates/estimate-filters.ts'
import type { EstimateFilters } from '../../features/estimates/estimate-filters.ts'

interface EstimatesViewProps {
  estimates: Fetched<Estimate[]>
  filters: EstimateFilters
  onFilter: (filters: Record<string, string>) => void
}

/** The library of published explicit inequalities. */
export function EstimatesView({ estimates, filters, onFilter }: EstimatesViewProps) {
  return (
    <Page
      about={pageHead('estimates')}
      head={
        <>
          <h1>Estimates</h1>
          <p className="mt-2 max-w-prose text-soft">
            Published explicit inequalities that bound what a sum leaves out. A certificate names each one that it uses and where; where one falls, what
            rests on it falls with it.
          </p>
        </>
      }
    >
      <EstimateFiltersForm filters={filters} onFilter={onFilter} />
      <Part of={estimates} what="the estimates">{(list) => <Shown all={list} shown={filterEstimates(list, filters)} />}</Part>
    </Page>
  )
}

function Shown({ all, shown }: { all: Estimate[]; shown: Estimate[] }) {
  if (all.length === 0)
    return (
      <Empty title="The library is empty.">
        <p>It comes with the engine: this installation runs an engine that knows none.</p>
      </Empty>
    )
  if (shown.length === 0)
    return (
      <Empty title="No estimate fits these filters.">
        <TextLink to={paths.estimates()}>Show all {all.length}</TextLink>
      </Empty>
    )
  return (
    <>
      <EstimateTable estimates={shown} />
      <p className="mt-4 text-[0.92rem] text-soft">
        {shown.length === all.length ? `${all.length} estimates` : `${shown.length} of ${all.length} estimates`}
      </p>
    </>
  )
}

function EstimateFiltersForm({ filters, onFilter }: { filters: EstimateFilters; onFilter: EstimatesViewProps['onFilter'] }) {
  const filtered = Object.values(filters).some((value) => value !== '')
  const select = (name: 'conditional' | 'state' | 'use', label: string, options: Record<string, string>) => (
    <Field label={label} className="w-40">
      {(control) => (
        <Select {...control} name={name} defaultValue={filters[name]}>
          <option value="">all</option>
          <Options of={options} />
        </Select>
      )}
    </Field>
  )
  return (
    <FilterForm label="Filter the estimates" filters={filters} onFilter={onFilter} className="mb-5 flex flex-wrap items-end gap-x-5 gap-y-3 print:hidden">
      <Field label="Words" className="w-64 max-w-full">
        {(control) => <TextInput {...control} name="text" type="search" defaultValue={filters.text} placeholder="theta · Math. Comp. · 10^19" />}
      </Field>
      {select('conditional', 'Conditional', { no: 'no', yes: 'yes' })}
      {select('state', 'State', { 'in-force': 'in force', 'in-doubt': 'in doubt' })}
      {select('use', 'Use', { used: 'by signed claims' })}
      <FilterButtons clearTo={filtered ? paths.estimates() : null} />
    </FilterForm>
  )
}
