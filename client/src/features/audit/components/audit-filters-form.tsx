import { useRef } from 'react'
import type { FormEvent } from 'react'
import type { Member } from '../../../../../shared/schemas/member.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, Select, TextInput } from '../../../components/ui/field.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
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

/** Filters of the trail. Choosing filters at once, typing does with Enter or the button. */
export function AuditFiltersForm({ filters, members, onFilter, clearTo }: AuditFiltersFormProps) {
  const form = useRef<HTMLFormElement>(null)
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const entries = [...new FormData(event.currentTarget)].map(([key, value]) => [key, String(value).trim()])
    onFilter(Object.fromEntries(entries.filter(([, value]) => value !== '')) as AuditFilters)
  }
  const at = (name: AuditFilter) => ({ name, defaultValue: filters[name] ?? '' })
  const choose = { onChange: () => form.current?.requestSubmit() }
  const acts = { ...(filters.act && !(filters.act in ACT_FAMILIES) ? { [filters.act]: filters.act } : {}), ...ACT_FAMILIES }
  return (
    <form
      ref={form}
      key={JSON.stringify([filters, members.length])}
      role="search"
      aria-label="Filter the audit trail"
      onSubmit={submit}
      className="mb-5 grid grid-cols-2 gap-x-5 gap-y-3 sm:grid-cols-4 print:hidden"
    >
      <Field label="Words or digest">{(control) => <TextInput {...control} {...at('text')} type="search" />}</Field>
      <Field label="Acts">
        {(control) => (
          <Select {...control} {...at('act')} {...choose}>
            <option value="">all</option>
            {Object.entries(acts).map(([start, words]) => (
              <option key={start} value={start}>
                {words}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="By">
        {(control) => (
          <Select {...control} {...at('actor')} {...choose}>
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
          <Select {...control} {...at('subjectKind')} {...choose}>
            <option value="">anything</option>
            {Object.entries(SUBJECT_KINDS).map(([kind, words]) => (
              <option key={kind} value={kind}>
                {words}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="From">{(control) => <TextInput {...control} {...at('from')} type="date" />}</Field>
      <Field label="To">{(control) => <TextInput {...control} {...at('to')} type="date" />}</Field>
      <div className="flex items-end gap-4">
        <Button type="submit" className="min-h-[2.45rem]">
          Find
        </Button>
        {clearTo && (
          <TextLink to={clearTo} className="pb-2">
            Clear
          </TextLink>
        )}
      </div>
      {filters.subjectId && <input type="hidden" name="subjectId" defaultValue={filters.subjectId} />}
    </form>
  )
}
