import { useEffect, useState } from 'react'
import { invitationInput } from '../../../../../shared/schemas/member.ts'
import type { Invitation, InvitationInput } from '../../../../../shared/schemas/member.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import { RolesField } from '../../members/components/roles-field.tsx'

/** Invites somebody by mail. */
export function InviteForm({ onInvite }: { onInvite: (input: InvitationInput) => Promise<Invitation> }) {
  const [sent, setSent] = useState<Invitation | null>(null)
  const { form, submit, errorAt, rootError, sending } = useApiForm(invitationInput, { email: '', name: '', roles: ['researcher'] }, async (values) => {
    setSent(null)
    setSent(await onInvite(values))
  })
  const { isSubmitSuccessful } = form.formState
  useEffect(() => {
    if (isSubmitSuccessful) form.reset()
  }, [form, isSubmitSuccessful])
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl gap-4">
      {rootError && (
        <Notice tone="refused" title="Not invited." live>
          {rootError}
        </Notice>
      )}
      {sent && (
        <Notice tone="done" title={`${sent.name} is invited.`} live>
          A mail with a link goes to {sent.email}. The link works once, until <Time at={sent.expiresAt} precise />, and lets {sent.name} set a password.
        </Notice>
      )}
      <Field label="E-mail address" error={errorAt('email')}>
        {(control) => <TextInput {...control} {...form.register('email')} type="email" autoComplete="off" autoCapitalize="none" spellCheck={false} />}
      </Field>
      <Field label="Name" hint="They can change it when they accept." error={errorAt('name')}>
        {(control) => <TextInput {...control} {...form.register('name')} autoComplete="off" />}
      </Field>
      <RolesField legend="To take part as" field={form.register('roles')} error={errorAt('roles')} />
      <div>
        <Button type="submit" tone="act" busy={sending && 'Inviting …'}>
          Send the invitation
        </Button>
      </div>
    </form>
  )
}
