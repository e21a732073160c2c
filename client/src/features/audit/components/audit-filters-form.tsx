import type { Member } from '../../../../../shared/schemas/member.ts'
import { Field, Options, Select, TextInput } from '../../../components/ui/field.tsx'
import { FilterButtons, FilterForm } from '../../../components/ui/filter-form.tsx'
import { ACT_FAMILIES } from '../act-words.ts'
import { SUBJECT_KINDS } from '../audit-filters.ts'
import type { AuditFilter, AuditFilters } from '../audit-filters.ts'

interface AuditFiltersFormProps {
  filters: AuditFilters
  members: Member[]
  onFilter: (filters: AuditFilters) => void
  /** Address of the whole trail; null when no filter is set. */
  clearTo: string | null
}

/** Filters of the trail. */
export function AuditFiltersForm({ filters, members, onFilter, clearTo }: AuditFiltersFormProps) {
  const at = (name: AuditFilter) => ({ name, defaultValue: filters[name] ?? '' })
  const acts = { ...(filters.act && !(filters.act in ACT_FAMILIES) ? { [filters.act]: filters.act } : {}), ...ACT_FAMILIES }
  return (
    <FilterForm label="Filter the audit trail" filters={[filters, members.length]} onFilter={onFilter} className="mb-5 grid grid-cols-2 gap-x-5 gap-y-3 sm:grid-cols-4 print:hidden">
      <Field label="Words or digest">{(control) => <TextInput {...control} {...at('text')} type="search" />}</Field>
      <Field label="Acts">
        {(control) => (
          <Select {...control} {...at('act')}>
            <option value="">all</option>
            <Options of={acts} />
          </Select>
        )}
      </Field>
      <Field label="By">
        {(control) => (
          <Select {...control} {...at('actor')}>
            <option value="">anybody</option>
            {members.map(({ id, name, state }) => (
              <option key={id} value={id}>
                {name}
                {state === 'left' ? ' (former)' : ''}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="About">
        {(control) => (
          <Select {...control} {...at('subjectKind')}>
            <option value="">anything</option>
            <Options of={SUBJECT_KINDS} />
          </Select>
        )}
      </Field>
      <Field label="From">{(control) => <TextInput {...control} {...at('from')} type="date" />}</Field>
      <Field label="To">{(control) => <TextInput {...control} {...at('to')} type="date" />}</Field>
      <FilterButtons clearTo={clearTo} />
      {filters.subjectId && <input type="hidden" name="subjectId" defaultValue={filters.subjectId} />}
    </FilterForm>
  )
}
