import { useState } from 'react'
import { departureInput } from '../../../../../shared/schemas/member.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Actions, Dialog } from '../../../components/ui/dialog.tsx'
import { Field, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'

interface LeaveGroupProps {
  group: string
  onLeave: (input: { password: string }) => Promise<unknown>
}

/** Leaving for good, asked once and with the password. */
export function LeaveGroup({ group, onLeave }: LeaveGroupProps) {
  const [asking, setAsking] = useState(false)
  return (
    <>
      <p className="max-w-prose">Your name stays on what you claimed, confirmed and signed. A group is never left without a lead.</p>
      <p className="mt-3">
        <Button onClick={() => setAsking(true)}>Leave {group} …</Button>
      </p>
      <Dialog open={asking} title={`Leave ${group}`} onClose={() => setAsking(false)}>
        <LeaveForm group={group} onLeave={onLeave} onClose={() => setAsking(false)} />
      </Dialog>
    </>
  )
}

function LeaveForm({ group, onLeave, onClose }: LeaveGroupProps & { onClose: () => void }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(departureInput, { password: '' }, (values) => onLeave(values))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-4">
      <p>You are signed out everywhere at once, your access tokens stop working, and you can come back only by a new invitation. Your drafts stay with the group.</p>
      {rootError && (
        <Notice tone="refused" title="Not left." live>
          {rootError}
        </Notice>
      )}
      <Field label="Your password" error={errorAt('password')} className="max-w-[26rem]">
        {(control) => <TextInput {...control} {...form.register('password')} type="password" autoComplete="current-password" />}
      </Field>
      <Actions>
        <Button type="submit" tone="grave" busy={sending && 'Leaving …'}>
          Leave {group}
        </Button>
        <Button onClick={onClose}>Stay</Button>
      </Actions>
    </form>
  )
}
