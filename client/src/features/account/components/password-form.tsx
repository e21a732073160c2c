import { useEffect, useState } from 'react'
import { passwordChange } from '../../../../../shared/schemas/session.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Field, TextInput } from '../../../components/ui/field.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { useApiForm } from '../../../lib/use-api-form.ts'
import type { PasswordChange } from '../queries.ts'

/** Changes the password, which ends every other session. */
export function PasswordForm({ email, onSave }: { email: string; onSave: (change: PasswordChange) => Promise<unknown> }) {
  const [saved, setSaved] = useState(false)
  const { form, submit, errorAt, rootError, sending } = useApiForm(passwordChange, { current: '', next: '' }, async (values) => {
    setSaved(false)
    await onSave(values)
    setSaved(true)
  })
  // The library's own way: only once it has counted the submission as done does emptying the fields last.
  const { isSubmitSuccessful } = form.formState
  useEffect(() => {
    if (isSubmitSuccessful) form.reset()
  }, [form, isSubmitSuccessful])
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-xl gap-4">
      {rootError && <Notice tone="refused" title="Not changed." live>{rootError}</Notice>}
      {saved && <Notice tone="done" title="Changed." live>You stay signed in here; all other sessions have ended. Access tokens go on working until they expire or are revoked.</Notice>}
      <input type="email" value={email} readOnly hidden autoComplete="username" />
      <Field label="Password now" error={errorAt('current')}>
        {(control) => <TextInput {...control} {...form.register('current')} type="password" autoComplete="current-password" />}
      </Field>
      <Field label="New password" hint="At least 12 characters. A few words that don’t belong together are easy to remember and hard to guess." error={errorAt('next')}>
        {(control) => <TextInput {...control} {...form.register('next')} type="password" autoComplete="new-password" />}
      </Field>
      <div>
        <Button type="submit" busy={sending && 'Changing …'}>
          Change password
        </Button>
      </div>
    </form>
  )
}
