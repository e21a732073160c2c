import { pageHead } from '../../../../shared/page-head.ts'
import { invitationAcceptance } from '../../../../shared/schemas/member.ts'
import type { InvitationOffer } from '../../../../shared/schemas/member.ts'
import { paths } from '../../app/paths.ts'
import { Button } from '../../components/ui/button.tsx'
import { ErrorView } from '../../components/ui/feedback.tsx'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { Field, TextInput } from '../../components/ui/field.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'
import { Time } from '../../components/ui/time.tsx'
import type { InvitationAcceptance } from '../../features/joining/queries.ts'
import { ROLE_WORDS } from '../../features/members/role-words.ts'
import { ApiError } from '../../lib/errors.ts'
import { useApiForm } from '../../lib/use-api-form.ts'

interface InvitationViewProps {
  offer: Fetched<InvitationOffer>
  /** Somebody is signed in already; accepting would sign them out. */
  signedInAs: string | null
  onAccept: (input: InvitationAcceptance) => Promise<unknown>
}

/** What one is invited to, and the form that makes the account. */
export function InvitationView({ offer, signedInAs, onAccept }: InvitationViewProps) {
  if (offer.data === undefined && offer.error instanceof ApiError && [400, 404, 410].includes(offer.error.status)) return <UsedUp error={offer.error} />
  return (
    <Page about={pageHead('invitation')} head={<h1>{offer.data ? `Join ${offer.data.group}` : 'Invitation'}</h1>}>
      <Part of={offer} what="the invitation">{(data) => <Acceptance offer={data} signedInAs={signedInAs} onAccept={onAccept} />}</Part>
    </Page>
  )
}

function UsedUp({ error }: { error: ApiError }) {
  return (
    <Page about={pageHead('invitation')} head={<h1>Invitation</h1>}>
      <ErrorView title="This invitation can’t be accepted" error={error} />
      <p className="mt-4 max-w-prose">
        If you have accepted it before, <TextLink to={paths.signIn()}>sign in</TextLink>. Otherwise ask whoever invited you to send it again: the new
        mail brings a new link.
      </p>
    </Page>
  )
}

function Acceptance({ offer, signedInAs, onAccept }: { offer: InvitationOffer; signedInAs: string | null; onAccept: InvitationViewProps['onAccept'] }) {
  const { form, submit, errorAt, rootError, sending } = useApiForm(invitationAcceptance, { name: offer.name, password: '' }, (values) => onAccept(values))
  return (
    <div className="grid gap-12 wide:grid-cols-[26rem_1fr]">
      <form onSubmit={(event) => void submit(event)} noValidate className="grid content-start gap-5">
        {signedInAs && (
          <Notice tone="undecided" title={`You are signed in as ${signedInAs}.`}>
            Accepting signs you out there and in as {offer.email}.
          </Notice>
        )}
        {rootError && (
          <Notice tone="refused" title="Not accepted." live>
            {rootError}
          </Notice>
        )}
        <Field label="E-mail address" hint="You sign in with it.">
          {(control) => <TextInput {...control} value={offer.email} type="email" readOnly autoComplete="username" className="bg-shade" />}
        </Field>
        <Field label="Name" hint="As it is to stand on claims, reviews and signatures." error={errorAt('name')}>
          {(control) => <TextInput {...control} {...form.register('name')} autoComplete="name" />}
        </Field>
        <Field label="Password" hint="At least 12 characters. A few words that don’t belong together are easy to remember and hard to guess." error={errorAt('password')}>
          {(control) => <TextInput {...control} {...form.register('password')} type="password" autoComplete="new-password" />}
        </Field>
        <div>
          <Button type="submit" tone="act" busy={sending && 'Joining …'}>
            Join {offer.group}
          </Button>
        </div>
      </form>
      <div className="max-w-prose wide:border-l wide:border-rule wide:pl-8">
        <p>
          {offer.invitedBy} invites you to take part in {offer.group} as {offer.roles.length === 1 ? 'a ' : ''}
          {offer.roles.join(', ')}.
        </p>
        <ul className="mt-3 grid gap-2 text-soft">
          {offer.roles.map((role) => (
            <li key={role}>
              A <strong className="font-semibold">{role}</strong> {ROLE_WORDS[role]}.
            </li>
          ))}
        </ul>
        <p className="mt-3 text-soft">
          The link works once, until <Time at={offer.expiresAt} precise />.
        </p>
      </div>
    </div>
  )
}
