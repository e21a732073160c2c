import { useState } from 'react'
import { z } from 'zod'
import { longText } from '../../../../../shared/schemas/common.ts'
import type { EstimateDoubt } from '../../../../../shared/schemas/estimate.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Actions } from '../../../components/ui/dialog.tsx'
import { Choice, Field, FieldSet, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { claimCount, ofFate } from '../doubt-words.ts'
import type { LiftInput } from '../queries.ts'

const liftForm = z.object({ reason: longText, reinstate: z.array(z.string()) })

interface LiftDoubtProps {
  doubt: EstimateDoubt
  onLift: (input: LiftInput) => Promise<unknown>
}

/** Puts the estimate in force again, and with it those of the suspended claims that the lead chooses. */
export function LiftDoubt({ doubt, onLift }: LiftDoubtProps) {
  const [open, setOpen] = useState(false)
  return open ? <LiftForm doubt={doubt} onLift={onLift} onCancel={() => setOpen(false)} /> : <Button onClick={() => setOpen(true)}>Lift the doubt …</Button>
}

function LiftForm({ doubt, onLift, onCancel }: LiftDoubtProps & { onCancel: () => void }) {
  const fallen = ofFate(doubt, 'fallen')
  const { form, submit, errorAt, rootError, sending } = useApiForm(liftForm, { reason: '', reinstate: fallen.map(({ id }) => id) }, (input) => onLift(input))
  const chosen = form.watch('reinstate').length
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-prose gap-4">
      <Field label="Reason" hint="It is kept in the audit trail and shown to every reader of the estimate." error={errorAt('reason')} required>
        {(control) => <TextArea {...control} {...form.register('reason')} autoFocus />}
      </Field>
      {fallen.length > 0 && (
        <FieldSet legend="Reinstate">
          {fallen.map((claim) => (
            <Choice key={claim.id} value={claim.id} label={claim.number} hint={claim.text} {...form.register('reinstate')} />
          ))}
          {fallen.length > 1 && (
            <p className="text-[0.92rem]">
              <Button tone="quiet" onClick={() => form.setValue('reinstate', chosen === fallen.length ? [] : fallen.map(({ id }) => id))}>
                {chosen === fallen.length ? 'Choose none' : 'Choose all'}
              </Button>
            </p>
          )}
        </FieldSet>
      )}
      {rootError && (
        <Notice tone="refused" title="Nothing was changed." live>
          {rootError}
        </Notice>
      )}
      <Actions>
        <Button type="submit" tone="act" busy={sending && 'Lifting …'}>
          {chosen > 0 ? `Lift the doubt and reinstate ${claimCount(chosen)}` : 'Lift the doubt'}
        </Button>
        <Button onClick={onCancel}>Not now</Button>
      </Actions>
    </form>
  )
}
