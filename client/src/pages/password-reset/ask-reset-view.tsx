import { useState } from 'react'
import { pageHead } from '../../../../shared/page-head.ts'
import { passwordResetInput } from '../../../../shared/schemas/session.ts'
import { paths } from '../../app/paths.ts'
import { Button } from '../../components/ui/button.tsx'
import { Field, TextInput } from '../../components/ui/field.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'
import type { PasswordResetInput } from '../../features/joining/queries.ts'
import { useApiForm } from '../../lib/use-api-form.ts'

/** Asks for a link to set a new password. The answer is the same whether the address is known or not. */
export function AskResetView({ onAsk }: { onAsk: (input: PasswordResetInput) => Promise<unknown> }) {
  const [asked, setAsked] = useState<string | null>(null)
  const { form, submit, errorAt, rootError, sending } = useApiForm(passwordResetInput, { email: '' }, async (values) => {
    setAsked(null)
    await onAsk(values)
    setAsked(values.email)
  })
  return (
    <Page about={pageHead('forgotPassword')} head={<h1>Forgotten the password?</h1>}>
      <form onSubmit={(event) => void submit(event)} noValidate className="grid max-w-[26rem] gap-5">
        {rootError && (
          <Notice tone="refused" title="Not asked." live>
            {rootError}
          </Notice>
        )}
        {asked && (
          <Notice tone="done" title="Asked." live>
            If {asked} belongs to a member, a mail with a link is on its way. The link works once, within an hour. If no mail comes, look
            among the unwanted ones, or ask a lead of your group which address they invited.
          </Notice>
        )}
        <Field label="E-mail address" hint="The one that you sign in with." error={errorAt('email')}>
          {(control) => <TextInput {...control} {...form.register('email')} type="email" autoComplete="username" autoCapitalize="none" spellCheck={false} />}
        </Field>
        <div className="flex flex-wrap items-center gap-x-6 gap-y-3">
          <Button type="submit" tone="act" busy={sending && 'Asking …'}>
            Mail me a link
          </Button>
          <TextLink to={paths.signIn()}>Back to signing in</TextLink>
        </div>
      </form>
    </Page>
  )
}
