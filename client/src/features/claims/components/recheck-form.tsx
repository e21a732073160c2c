import { z } from 'zod'
import { arithmetic, method } from '../../../../../shared/schemas/run.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import type { Method } from '../../../../../shared/engine/methods/computation.ts'
import type { Definition } from '../../../../../shared/engine/sets/definition.ts'
import { METHOD_WORDS } from '../../../../../shared/words.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, Select, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import type { DoAct } from '../queries.ts'

const recheckForm = z.object({ method, arithmetic, digits: z.string().trim().regex(/^[1-9]\d{0,4}$/, 'Write a whole number of digits.') })

/** The methods made for a kind of definition, the usual one first; whether one reaches the digits the server says. */
function methodsFor(claim: Claim): readonly [Method, ...Method[]] {
  const canonical = claim.definition.canonical as Definition
  if (canonical.type !== 'series') return ['expansion']
  return canonical.set.kind === 'finite' ? ['finite'] : ['transform', 'panels', 'partial-sum', 'derivatives']
}

/** Starts a recheck; by default the claim's own method with the other arithmetic. */
export function RecheckForm({ claim, onAct }: { claim: Claim; onAct: DoAct }) {
  const methods = methodsFor(claim)
  const { form, submit, errorAt, rootError, sending } = useApiForm(
    recheckForm,
    { method: claim.run?.method ?? methods[0], arithmetic: claim.run?.arithmetic === 'ball' ? 'mpfr' : 'ball', digits: String(Math.max(1, claim.digits?.truncated ?? 20)) },
    ({ digits, ...rest }) => onAct('recheck', { ...rest, digits: Number(digits) }),
  )
  return (
    <form onSubmit={(event) => void submit(event)} noValidate>
      <h3 className="mb-2">Recheck it</h3>
      <p className="mb-3 max-w-prose text-soft">
        The server encloses the same constant once more and holds both enclosures side by side. Other arithmetic or another method counts as independent
        {claim.run ? `; the claim was made by ${METHOD_WORDS[claim.run.method]} with ${claim.run.arithmetic}` : ''}.
      </p>
      <div className="grid max-w-2xl gap-4 sm:grid-cols-[2fr_1fr_1fr]">
        <Field label="Method" error={errorAt('method')}>
          {(control) => (
            <Select {...control} {...form.register('method')}>
              {methods.map((name) => (
                <option key={name} value={name}>
                  {METHOD_WORDS[name]}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Field label="Arithmetic" error={errorAt('arithmetic')}>
          {(control) => (
            <Select {...control} {...form.register('arithmetic')}>
              <option value="ball">ball</option>
              <option value="mpfr">mpfr</option>
            </Select>
          )}
        </Field>
        <Field label="Digits" error={errorAt('digits')}>
          {(control) => <TextInput {...control} {...form.register('digits')} inputMode="numeric" />}
        </Field>
      </div>
      {rootError && (
        <Notice tone="refused" title="Not started." live className="mt-3">
          {rootError}
        </Notice>
      )}
      <Button type="submit" className="mt-4" busy={sending && 'Starting …'}>
        Start the recheck
      </Button>
    </form>
  )
}
