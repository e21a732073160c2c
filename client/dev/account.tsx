import { useState } from 'react'
import type { Account } from '../../shared/schemas/member.ts'
import type { AccessToken, OwnSession } from '../../shared/schemas/session.ts'
import type { AccessTokenCreated } from '../src/features/account/queries.ts'
import { AccountView } from '../src/pages/account/account-view.tsx'

const account: Account = {
  id: '00000000-0000-4000-8000-000000000001', name: 'Ilse Varga', email: 'ilse.varga@harrow-institute.example', roles: ['researcher', 'referee', 'lead'],
  group: { id: '00000000-0000-4000-8000-000000000002', name: 'Harrow Institute for Explicit Estimates' },
  mailPreferences: { 'claim-signed': true, 'claim-suspended': true, 'claim-withdrawn': false },
}
const session = (index: number, userAgent: string, current = false): OwnSession => ({
  id: `00000000-0000-4000-8000-00000000001${index}`, current, address: `203.0.113.${index}`, userAgent, createdAt: `2026-03-0${index}T08:00:00Z`, lastSeenAt: `2026-03-1${index}T09:30:00Z`, expiresAt: '2026-04-10T08:00:00Z',
})
const sessions = [
  session(1, 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', true),
  session(2, 'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/138.0.0.0 Safari/537.36'),
  session(3, 'Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.0 Mobile/15E148 Safari/604.1'),
]
const token = (index: number, name: string, state: AccessToken['state'], scopes: AccessToken['scopes']): AccessToken => ({
  id: `00000000-0000-4000-8000-00000000002${index}`, name, scopes, state, createdAt: '2026-01-01T00:00:00Z', expiresAt: '2026-05-01T00:00:00Z', lastUsedAt: index === 2 ? null : '2026-03-12T14:05:00Z',
})
const tokens = [token(1, 'nightly table of k = 1 … 12', 'active', ['read', 'run']), token(2, 'draft of the odd ones', 'active', ['read', 'run', 'draft']), token(3, 'workshop', 'revoked', ['read'])]
const have = <Data,>(data: Data) => ({ data, error: null, onRetry: () => undefined })
const done = () => new Promise<void>((resolve) => setTimeout(resolve, 600))

export function AccountExample() {
  const [newToken, setNewToken] = useState<AccessTokenCreated | null>({ ...tokens[0] as AccessToken, name: 'bibliography', token: 'mst_3sK9pQ7vXw2LrTn5YbHc8DfGj4ZmE6aUoWiPqRtSdVe' })
  return (
    <AccountView
      account={have(account)} sessions={have(sessions)} tokens={have(tokens)} newToken={newToken} origin="http://localhost:4600"
      onName={done} onMail={done} onPassword={done} onEndSessions={done} onCreateToken={done} onRevokeToken={done} onPutTokenAway={() => setNewToken(null)}
    />
  )
}
