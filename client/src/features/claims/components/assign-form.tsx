import { act } from '../../../../../shared/schemas/claim.ts'
import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, Select, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import type { DoAct } from '../queries.ts'

/** The lead asks a referee, of the own group or of another. */
export function AssignForm({ claim, onAct }: { claim: Claim; onAct: DoAct }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(act.assign, { refereeId: '', note: '' }, async (input, all) => {
    await onAct('assign', input)
    all.reset()
  })
  if (claim.possibleReferees.length === 0) return <p className="text-soft">There is no member with the role of referee who could be asked. Invite one, or give a member the role.</p>
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose justify-items-start gap-4">
      <Field label="Referee" error={errorAt('refereeId') && 'Choose a referee.'} className="w-full max-w-md">
        {(control) => (
          <Select {...control} {...form.register('refereeId')}>
            <option value="">choose …</option>
            {claim.possibleReferees.map((person) => (
              <option key={person.id} value={person.id}>
                {person.name}, {person.group}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="Note" hint="Goes into the mail that asks the referee." error={errorAt('note')} className="w-full">
        {(control) => <TextArea {...control} {...form.register('note')} rows={2} className="min-h-16" />}
      </Field>
      {rootError && (
        <Notice tone="refused" title="Nobody was asked." live>
          {rootError}
        </Notice>
      )}
      <Button type="submit" tone="act" busy={sending && 'Asking …'}>
        Ask this referee
      </Button>
    </form>
  )
}
