import { pageHead } from '../../../../shared/page-head.ts'
import type { Account, MailPreferences } from '../../../../shared/schemas/member.ts'
import type { AccessToken, AccessTokenInput, OwnSession } from '../../../../shared/schemas/session.ts'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { Facts, MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { MailForm } from '../../features/account/components/mail-form.tsx'
import { NameForm } from '../../features/account/components/name-form.tsx'
import { NewToken } from '../../features/account/components/new-token.tsx'
import { PasswordForm } from '../../features/account/components/password-form.tsx'
import { SessionList } from '../../features/account/components/session-list.tsx'
import { TokenForm } from '../../features/account/components/token-form.tsx'
import { TokenList } from '../../features/account/components/token-list.tsx'
import type { AccessTokenCreated, PasswordChange } from '../../features/account/queries.ts'

interface AccountViewProps {
  account: Fetched<Account>
  sessions: Fetched<OwnSession[]>
  tokens: Fetched<AccessToken[]>
  /** A token that was made on this page and is still to be copied. */
  newToken: AccessTokenCreated | null
  origin: string
  onName: (name: string) => Promise<unknown>
  onMail: (preferences: MailPreferences) => Promise<unknown>
  onPassword: (change: PasswordChange) => Promise<unknown>
  onEndSessions: (ids: string[]) => Promise<unknown>
  onCreateToken: (input: AccessTokenInput) => Promise<unknown>
  onRevokeToken: (id: string) => Promise<unknown>
  onPutTokenAway: () => void
}

/** One's own account: name, mails, password, sessions, access tokens. */
export function AccountView(props: AccountViewProps) {
  const { account, sessions, tokens, newToken, origin } = props
  return (
    <Page about={pageHead('account')} head={<h1>Account</h1>} margin={account.data && <Membership account={account.data} />}>
      <Part of={account} what="your account">
        {(own) => (
          <>
            <Section title="Name">
              <NameForm name={own.name} onSave={props.onName} />
            </Section>
            <Section title="Mail">
              <MailForm preferences={own.mailPreferences} roles={own.roles} email={own.email} onSave={props.onMail} />
            </Section>
            <Section title="Password">
              <PasswordForm email={own.email} onSave={props.onPassword} />
            </Section>
          </>
        )}
      </Part>
      <Section title="Where you are signed in" id="sessions">
        <Part of={sessions} what="your sessions">{(list) => <SessionList sessions={list} onEnd={props.onEndSessions} />}</Part>
      </Section>
      <Section title="Access tokens" id="tokens">
        <div className="grid gap-8">
          {newToken && <NewToken token={newToken} origin={origin} onPutAway={props.onPutTokenAway} />}
          <Part of={tokens} what="your access tokens">{(list) => <TokenList tokens={list} onRevoke={props.onRevokeToken} />}</Part>
          <TokenForm onCreate={props.onCreateToken} />
        </div>
      </Section>
    </Page>
  )
}

function Membership({ account }: { account: Account }) {
  return (
    <>
      <MarginNote title="Membership">
        <Facts facts={[['Group', account.group.name], ['Roles', account.roles.join(', ')], ['Address', account.email]]} />
      </MarginNote>
      <MarginNote title="To change these">
        <p>A lead of your group gives and takes roles. The address is the one that you were invited at.</p>
      </MarginNote>
    </>
  )
}
