import { useState } from 'react'
import type { AccessToken } from '../../../../../shared/schemas/session.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Confirm } from '../../../components/ui/confirm.tsx'
import { Empty } from '../../../components/ui/feedback.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { TOKEN_STATES } from '../token-words.ts'

interface TokenListProps {
  tokens: AccessToken[]
  onRevoke: (id: string) => Promise<unknown>
}

/** One's access tokens with their last use, each with the way to revoke it. */
export function TokenList({ tokens, onRevoke }: TokenListProps) {
  const [asked, setAsked] = useState<AccessToken | null>(null)
  const [busy, setBusy] = useState(false)
  const [error, setError] = useState<unknown>(null)
  const [revoked, setRevoked] = useState<string | null>(null)

  const revoke = async (token: AccessToken) => {
    setBusy(true)
    setError(null)
    try {
      await onRevoke(token.id)
      setRevoked(token.name)
      setAsked(null)
    } catch (refusal) {
      setError(refusal)
    } finally {
      setBusy(false)
    }
  }

  return (
    <div className="grid gap-4">
      {revoked && <Notice tone="done" title="Revoked." live>“{revoked}” opens nothing any more. A program that uses it is refused from now on.</Notice>}
      {tokens.length === 0 ? (
        <Empty title="No access token yet.">
          <p>Your programs use a token in place of your password: to read the register, start runs, or draft claims. Make one below.</p>
        </Empty>
      ) : (
        <Table
          caption="Access tokens"
          rows={tokens}
          rowKey={({ id }) => id}
          columns={[
            { key: 'name', header: 'Name', cell: ({ name }) => name },
            { key: 'scopes', header: 'May', cell: ({ scopes }) => scopes.join(', ') },
            { key: 'state', header: 'State', cell: ({ state }) => <span className={state === 'active' ? undefined : 'text-soft'}>{TOKEN_STATES[state]}</span> },
            { key: 'expires', header: 'Expires', cell: ({ expiresAt }) => <Time at={expiresAt} /> },
            { key: 'used', header: 'Last used', cell: ({ lastUsedAt }) => (lastUsedAt ? <Time at={lastUsedAt} precise /> : <span className="text-soft">never</span>) },
            {
              key: 'revoke', header: 'Revoke', plain: true,
              cell: (token) =>
                token.state === 'active' && (
                  <Button tone="quiet" className="whitespace-nowrap" aria-label={`Revoke ${token.name}`} onClick={() => { setError(null); setAsked(token) }}>
                    Revoke
                  </Button>
                ),
            },
          ]}
        />
      )}
      <Confirm
        open={asked !== null}
        title={`Revoke “${asked?.name ?? ''}”`}
        act="Revoke the token"
        busy={busy && 'Revoking …'}
        error={error}
        onConfirm={() => asked && void revoke(asked)}
        onClose={() => setAsked(null)}
      >
        <p>Whatever uses this token stops working at once, and it can’t be brought back. You can make a new one.</p>
      </Confirm>
    </div>
  )
}
