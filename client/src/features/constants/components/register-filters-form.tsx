import { STATE_WORDS } from '../../../../../shared/words.ts'
import { paths } from '../../../app/paths.ts'
import { Field, Options, Select, TextInput } from '../../../components/ui/field.tsx'
import { FilterButtons, FilterForm } from '../../../components/ui/filter-form.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import type { Query } from '../../../lib/api-client.ts'
import type { RegisterFilter } from '../register-filters.ts'
import { SET_WORDS } from '../set-words.ts'

interface RegisterFiltersFormProps {
  filters: Query
  /** Hears the filters that are set. */
  onFilter: (filters: Partial<Record<RegisterFilter, string>>) => void
  /** Address of the register without any filter; null when none is set. */
  clearTo: string | null
  /** What the server says against a filter. */
  errorAt: (filter: RegisterFilter) => string | undefined
}

/** Filters of the register. */
export function RegisterFiltersForm({ filters, onFilter, clearTo, errorAt }: RegisterFiltersFormProps) {
  const at = (name: RegisterFilter) => ({ name, defaultValue: String(filters[name] ?? '') })
  const more = (['power', 'logPower', 'exclude', 'minDigits'] as const).some((name) => filters[name] !== undefined)
  return (
    <FilterForm label="Filter the register" filters={filters} onFilter={onFilter} className="mb-5 grid gap-3 print:hidden">
      <div className="grid grid-cols-2 gap-x-5 gap-y-3 *:first:col-span-2 *:nth-2:col-span-2 sm:*:first:col-span-1 sm:*:nth-2:col-span-1 wide:grid-cols-[minmax(0,2fr)_minmax(0,2fr)_5rem_minmax(0,1.1fr)_auto]">
        <Field label="Words, a definition, or leading digits" error={errorAt('text')}>
          {(control) => <TextInput {...control} {...at('text')} type="search" placeholder="odd, k = 3 · 1/(p log p) · 1.6366" />}
        </Field>
        <Field label="Set" error={errorAt('set')}>
          {(control) => (
            <Select {...control} {...at('set')}>
              <option value="">any</option>
              <Options of={{ ...SET_WORDS, 'over-primes': 'Sums and products over the primes', named: 'Constants with a name' }} />
            </Select>
          )}
        </Field>
        <Field label={<i>k</i>} error={errorAt('k')}>{(control) => <TextInput {...control} {...at('k')} inputMode="numeric" pattern="[0-9]*" />}</Field>
        <Field label="State" error={errorAt('state')}>
          {(control) => (
            <Select {...control} {...at('state')}>
              <option value="">any</option>
              <Options of={STATE_WORDS} />
            </Select>
          )}
        </Field>
        <FilterButtons clearTo={clearTo} />
      </div>
      <details open={more}>
        <summary className="w-fit text-certain underline decoration-rule underline-offset-[0.2em]">By weight, exclusion, or digits</summary>
        <div className="mt-3 flex flex-wrap gap-5">
          <Field label={<>Power of <i>n</i></>} hint="1, 2, 3/2" error={errorAt('power')} className="w-32">{(control) => <TextInput {...control} {...at('power')} />}</Field>
          <Field label={<>Power of log <i>n</i></>} hint="1, 0, −1/2" error={errorAt('logPower')} className="w-36">{(control) => <TextInput {...control} {...at('logPower')} />}</Field>
          <Field label="Excluded primes" hint="2, 3 — or none" error={errorAt('exclude')} className="w-44">{(control) => <TextInput {...control} {...at('exclude')} />}</Field>
          <Field label="Certified digits" hint="at least" error={errorAt('minDigits')} className="w-36">{(control) => <TextInput {...control} {...at('minDigits')} inputMode="numeric" />}</Field>
        </div>
      </details>
      {/^\d+[.,]\d/.test(String(filters.text ?? '')) && (
        <p>
          Only what begins with these digits is listed. <TextLink to={paths.lookUp({ digits: String(filters.text) })}>Look up the digits</TextLink> to see what they are near to.
        </p>
      )}
    </FilterForm>
  )
}
