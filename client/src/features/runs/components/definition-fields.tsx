import type { UseFormReturn } from 'react-hook-form'
import { Field, FieldSet, Options, Select, TextArea, TextInput } from '../../../components/ui/field.tsx'
import { SET_WORDS } from '../../constants/set-words.ts'
import { SETS_WITH_K } from '../run-form.ts'
import type { FieldMessages, RunFormValues } from '../run-form.ts'

interface DefinitionFieldsProps {
  form: UseFormReturn<RunFormValues>
  errors: FieldMessages
}

/** What is summed or multiplied: a set and a weight, an expression over the primes, or a constant with a name. */
export function DefinitionFields({ form, errors }: DefinitionFieldsProps) {
  // react-hook-form tells of changes through `watch`; the view that owns the form already subscribes to all of it.
  const { type, set } = form.getValues()
  return (
    <div className="grid gap-5">
      <Field label="What is computed" error={errors.type}>
        {(control) => (
          <Select {...control} {...form.register('type')}>
            <option value="series">A sum over a set of integers</option>
            <option value="over-primes">A sum or product over the primes</option>
            <option value="named">A constant with a name</option>
          </Select>
        )}
      </Field>
      {type === 'named' && (
        <Field label="Name" error={errors.name}>
          {(control) => (
            <Select {...control} {...form.register('name')}>
              <option value="mertens">Mertens constant</option>
              <option value="twin-prime">Twin prime constant</option>
              <option value="artin">Artin’s constant</option>
            </Select>
          )}
        </Field>
      )}
      {type === 'over-primes' && (
        <div className="grid items-start gap-5 sm:grid-cols-[9.5rem_1fr]">
          <Field label="Combined as" hint="over the primes">
            {(control) => (
              <Select {...control} {...form.register('combine')}>
                <option value="sum">sum of</option>
                <option value="product">product of</option>
              </Select>
            )}
          </Field>
          <Field label={<>Expression in <i>p</i></>} hint="A sum of 1/(p*(p-1)), a product of 1 - 1/p^2" error={errors.expression}>
            {(control) => <TextInput {...control} {...form.register('expression')} spellCheck={false} autoComplete="off" />}
          </Field>
        </div>
      )}
      {type === 'series' && (
        <>
          <Field label="Set of integers" error={errors.set}>
            {(control) => (
              <Select {...control} {...form.register('set')}>
                <Options of={SET_WORDS} />
              </Select>
            )}
          </Field>
          <SetParameters form={form} errors={errors} />
          <WeightFields form={form} errors={errors} />
        </>
      )}
      {type !== 'named' && set !== 'finite' && (
        <Field label="Excluded primes" hint={`${type === 'over-primes' ? 'They' : 'Members divisible by one of them'} are left out. 2 leaves the odd ones; empty leaves out nothing.`} error={errors.exclude}>
          {(control) => <TextInput {...control} {...form.register('exclude')} inputMode="numeric" autoComplete="off" />}
        </Field>
      )}
    </div>
  )
}

function SetParameters({ form, errors }: DefinitionFieldsProps) {
  const { set } = form.getValues()
  const number = { inputMode: 'numeric', autoComplete: 'off' } as const
  return (
    <>
      {SETS_WITH_K.includes(set) && (
        <Field label={<i>k</i>} hint="How many prime factors" error={errors.k} narrow>
          {(control) => <TextInput {...control} {...form.register('k')} {...number} />}
        </Field>
      )}
      {set === 'smooth' && (
        <Field label={<i>y</i>} hint="Largest prime factor allowed" error={errors.y} narrow>
          {(control) => <TextInput {...control} {...form.register('y')} {...number} />}
        </Field>
      )}
      {set === 'residue-class' && (
        <div className="flex flex-wrap gap-5">
          <Field label="Residue" error={errors.residue} narrow>
            {(control) => <TextInput {...control} {...form.register('residue')} {...number} />}
          </Field>
          <Field label="Modulus" error={errors.modulus} narrow>
            {(control) => <TextInput {...control} {...form.register('modulus')} {...number} />}
          </Field>
        </div>
      )}
      {set === 'finite' && (
        <Field label="Members" hint="Whole numbers from 2 on, separated by commas or line breaks" error={errors.members}>
          {(control) => <TextArea {...control} {...form.register('members')} spellCheck={false} />}
        </Field>
      )}
    </>
  )
}

function WeightFields({ form, errors }: DefinitionFieldsProps) {
  return (
    <FieldSet legend={<>Weight 1 / (<i>n</i><sup className="text-[0.7em] leading-none"><i>s</i></sup> (log <i>n</i>)<sup className="text-[0.7em] leading-none"><i>b</i></sup>)</>}>
      <div className="grid max-w-md grid-cols-2 gap-5">
        <Field label={<i>s</i>} hint="1, 2, 3/2" error={errors.power}>
          {(control) => <TextInput {...control} {...form.register('power')} autoComplete="off" />}
        </Field>
        <Field label={<i>b</i>} hint="1, 0, −1, 1/2" error={errors.logPower}>
          {(control) => <TextInput {...control} {...form.register('logPower')} autoComplete="off" />}
        </Field>
      </div>
    </FieldSet>
  )
}
