import { useState } from 'react'
import { z } from 'zod'
import { longText } from '../../../../../shared/schemas/common.ts'
import { Button } from '../../../components/ui/button.tsx'
import type { ButtonTone } from '../../../components/ui/button.tsx'
import { Actions, Dialog } from '../../../components/ui/dialog.tsx'
import { Field, TextArea } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'

const reasonForm = z.object({ reason: longText })

interface ReasonedButtonProps {
  /** The act: "Return". */
  act: string
  /** What it is done to: "MST-0042/2". */
  object: string
  /** What will happen. */
  tells: string
  tone?: ButtonTone
  onAct: (reason: string) => Promise<unknown>
}

/** A button that asks for a reason, says what will happen, and only then acts. */
export function ReasonedButton({ act, object, tells, tone = 'plain', onAct }: ReasonedButtonProps) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <Button onClick={() => setOpen(true)}>{act} …</Button>
      <Dialog open={open} title={`${act} ${object}`} onClose={() => setOpen(false)}>
        <ReasonForm act={act} object={object} tells={tells} tone={tone} onCancel={() => setOpen(false)} onAct={(reason) => onAct(reason).then(() => setOpen(false))} />
      </Dialog>
    </>
  )
}

function ReasonForm({ act, object, tells, tone, onAct, onCancel }: ReasonedButtonProps & { onCancel: () => void }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(reasonForm, { reason: '' }, ({ reason }) => onAct(reason))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-4">
      <p>{tells}</p>
      <Field label="Reason" hint="It is kept with the claim’s history and told to those concerned." error={errorAt('reason')}>
        {(control) => <TextArea {...control} {...form.register('reason')} />}
      </Field>
      {rootError && (
        <Notice tone="refused" title="Nothing was changed." live>
          {rootError}
        </Notice>
      )}
      <Actions>
        <Button type="submit" tone={tone === 'plain' ? 'act' : tone} busy={sending && `${act} …`}>
          {act} {object}
        </Button>
        <Button onClick={onCancel}>Not now</Button>
      </Actions>
    </form>
  )
}
