import { useRef } from 'react'
import type { FormEvent } from 'react'
import { STATE_WORDS } from '../../../../../shared/words.ts'
import { paths } from '../../../app/paths.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, Select, TextInput } from '../../../components/ui/field.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import type { Query } from '../../../lib/api-client.ts'
import type { RegisterFilter } from '../register-filters.ts'
import { SET_WORDS } from '../set-words.ts'

interface RegisterFiltersFormProps {
  filters: Query
  /** Takes the filters as they stand; empty ones are left out of the address. */
  onFilter: (filters: Partial<Record<RegisterFilter, string>>) => void
  /** Address of the register without any filter; null when none is set. */
  clearTo: string | null
  /** What the server says against a filter. */
  errorAt: (filter: RegisterFilter) => string | undefined
}

/** Filters of the register. Choosing from a list filters at once, typing does with Enter or the button. */
export function RegisterFiltersForm({ filters, onFilter, clearTo, errorAt }: RegisterFiltersFormProps) {
  const form = useRef<HTMLFormElement>(null)
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    onFilter(Object.fromEntries([...new FormData(event.currentTarget)].map(([key, value]) => [key, String(value).trim()])))
  }
  const at = (name: RegisterFilter) => ({ name, defaultValue: String(filters[name] ?? '') })
  const choose = { onChange: () => form.current?.requestSubmit() }
  const more = (['power', 'logPower', 'exclude', 'minDigits'] as const).some((name) => filters[name] !== undefined)
  return (
    <form ref={form} key={JSON.stringify(filters)} role="search" aria-label="Filter the register" onSubmit={submit} className="mb-5 grid gap-3 print:hidden">
      <div className="grid grid-cols-2 gap-x-5 gap-y-3 *:first:col-span-2 *:nth-2:col-span-2 sm:*:first:col-span-1 sm:*:nth-2:col-span-1 wide:grid-cols-[minmax(0,2fr)_minmax(0,2fr)_5rem_minmax(0,1.1fr)_auto]">
        <Field label="Words, a definition, or leading digits" error={errorAt('text')}>
          {(control) => <TextInput {...control} {...at('text')} type="search" placeholder="odd, k = 3 · 1/(p log p) · 1.6366" />}
        </Field>
        <Field label="Set" error={errorAt('set')}>
          {(control) => (
            <Select {...control} {...at('set')} {...choose}>
              <option value="">any</option>
              {Object.entries(SET_WORDS).map(([kind, words]) => (
                <option key={kind} value={kind}>
                  {words}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Field label={<i>k</i>} error={errorAt('k')}>{(control) => <TextInput {...control} {...at('k')} inputMode="numeric" pattern="[0-9]*" />}</Field>
        <Field label="State" error={errorAt('state')}>
          {(control) => (
            <Select {...control} {...at('state')} {...choose}>
              <option value="">any</option>
              {Object.entries(STATE_WORDS).map(([state, word]) => (
                <option key={state} value={state}>
                  {word}
                </option>
              ))}
            </Select>
          )}
        </Field>
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
    </form>
  )
}
