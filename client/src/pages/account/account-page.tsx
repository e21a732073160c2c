import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { fetched } from '../../components/ui/fetched.tsx'
import { accessTokensQuery, accountQuery, ownSessionsQuery, useChangeAccount, useChangePassword, useCreateAccessToken, useEndSessions, useRevokeAccessToken } from '../../features/account/queries.ts'
import type { AccessTokenCreated } from '../../features/account/queries.ts'
import { AccountView } from './account-view.tsx'

export function AccountPage() {
  const account = useQuery(accountQuery())
  const sessions = useQuery(ownSessionsQuery())
  const tokens = useQuery(accessTokensQuery())
  const change = useChangeAccount()
  const password = useChangePassword()
  const end = useEndSessions()
  const create = useCreateAccessToken()
  const revoke = useRevokeAccessToken()
  const [newToken, setNewToken] = useState<AccessTokenCreated | null>(null)

  return (
    <AccountView
      account={fetched(account)}
      sessions={fetched(sessions)}
      tokens={fetched(tokens)}
      newToken={newToken}
      origin={window.location.origin}
      onName={(name) => change.mutateAsync({ name })}
      onMail={(mailPreferences) => change.mutateAsync({ mailPreferences })}
      onPassword={password.mutateAsync}
      onEndSessions={end.mutateAsync}
      onCreateToken={async (input) => setNewToken(await create.mutateAsync(input))}
      onRevokeToken={revoke.mutateAsync}
      onPutTokenAway={() => setNewToken(null)}
    />
  )
}
