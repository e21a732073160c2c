import type { z } from 'zod'
import { pageHead } from '../../../../shared/page-head.ts'
import type { signInInput, SignInInput } from '../../../../shared/schemas/session.ts'
import { paths } from '../../app/paths.ts'
import { Button } from '../../components/ui/button.tsx'
import { Field, TextInput } from '../../components/ui/field.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'
import type { ApiForm } from '../../lib/use-api-form.ts'

interface SignInViewProps {
  form: ApiForm<SignInInput, z.output<typeof signInInput>>
  /** A page that is only for members was asked for. */
  asked: boolean
}

export function SignInView({ form: { form, submit, errorAt, rootError, sending }, asked }: SignInViewProps) {
  return (
    <Page about={pageHead('signIn')} head={<h1>Sign in</h1>}>
      <div className="grid gap-12 wide:grid-cols-[26rem_1fr]">
        <form onSubmit={(event) => void submit(event)} noValidate className="grid content-start gap-5">
          {asked && <p className="text-soft">The page you asked for is for members. Sign in, and it opens.</p>}
          {rootError && (
            <Notice tone="refused" title="Not signed in." live>
              {rootError}
            </Notice>
          )}
          <Field label="E-mail address" error={errorAt('email')}>
            {(control) => <TextInput {...control} {...form.register('email')} type="email" autoComplete="username" autoCapitalize="none" spellCheck={false} />}
          </Field>
          <Field label="Password" error={errorAt('password')}>
            {(control) => <TextInput {...control} {...form.register('password')} type="password" autoComplete="current-password" />}
          </Field>
          <div className="flex flex-wrap items-center gap-x-6 gap-y-3">
            <Button type="submit" tone="act" busy={sending && 'Signing in …'}>
              Sign in
            </Button>
            <TextLink to={paths.forgotPassword()}>Forgotten the password?</TextLink>
          </div>
        </form>
        <div className="max-w-prose text-soft wide:border-l wide:border-rule wide:pl-8">
          <p>Accounts are made by invitation: ask a lead of your group. The link in the invitation sets your password.</p>
          <p className="mt-3">
            What is signed and public needs no account. <TextLink to={paths.register()}>Read the register.</TextLink>
          </p>
        </div>
      </div>
    </Page>
  )
}
