import { useState } from 'react'
import { pageHead } from '../../../../shared/page-head.ts'
import { passwordResetCompletion } from '../../../../shared/schemas/session.ts'
import { paths } from '../../app/paths.ts'
import { Button } from '../../components/ui/button.tsx'
import { ErrorView } from '../../components/ui/feedback.tsx'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { Field, TextInput } from '../../components/ui/field.tsx'
import { ButtonLink, TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'
import { Time } from '../../components/ui/time.tsx'
import type { PasswordResetCompletion, PasswordResetOffer } from '../../features/joining/queries.ts'
import { ApiError } from '../../lib/errors.ts'
import { useApiForm } from '../../lib/use-api-form.ts'

interface SetPasswordViewProps {
  offer: Fetched<PasswordResetOffer>
  onSet: (input: PasswordResetCompletion) => Promise<unknown>
}

/** Sets a new password by a mailed link. */
export function SetPasswordView({ offer, onSet }: SetPasswordViewProps) {
  const [done, setDone] = useState(false)
  const usedUp = offer.data === undefined && offer.error instanceof ApiError && [400, 404, 410].includes(offer.error.status)
  return (
    <Page about={pageHead('passwordReset')} head={<h1>Set a new password</h1>}>
      {done ? (
        <div className="grid max-w-prose justify-items-start gap-5">
          <Notice tone="done" title="Your password is set." live>
            Every session has ended, and the link works no more. Sign in with the new password.
          </Notice>
          <ButtonLink to={paths.signIn()} tone="act">
            Sign in
          </ButtonLink>
        </div>
      ) : usedUp ? (
        <>
          <ErrorView title="This link can’t be used" error={offer.error} />
          <p className="mt-4">
            <TextLink to={paths.forgotPassword()}>Ask for a new link</TextLink>
          </p>
        </>
      ) : (
        <Part of={offer} what="the link">
          {(data) => (
            <NewPassword
              offer={data}
              onSet={async (input) => {
                await onSet(input)
                setDone(true)
              }}
            />
          )}
        </Part>
      )}
    </Page>
  )
}

function NewPassword({ offer, onSet }: { offer: PasswordResetOffer; onSet: SetPasswordViewProps['onSet'] }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(passwordResetCompletion, { password: '' }, (values) => onSet(values))
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-[26rem] gap-5">
      {rootError && (
        <Notice tone="refused" title="Not set." live>
          {rootError}
        </Notice>
      )}
      <p className="text-soft">
        For {offer.email}. The link works once, until <Time at={offer.expiresAt} precise />.
      </p>
      <input type="email" value={offer.email} readOnly hidden autoComplete="username" />
      <Field label="New password" hint="At least 12 characters. A few words that don’t belong together are easy to remember and hard to guess." error={errorAt('password')}>
        {(control) => <TextInput {...control} {...form.register('password')} type="password" autoComplete="new-password" />}
      </Field>
      <div>
        <Button type="submit" tone="act" busy={sending && 'Setting …'}>
          Set the password
        </Button>
      </div>
    </form>
  )
}
