import type { Role } from '../../shared/permissions.ts'
import { change, selectByKey } from '../db.ts'
import type { SignedInMember } from '../middleware/request.ts'

interface Row {
  id: string
  group_id: string
  group_name: string
  name: string
  email: string
  roles: Role[]
  via_id: string
  scopes: string[]
  stale: boolean
}

const MEMBER = 'm.id, m.group_id, g.name AS group_name, m.name, m.email, m.roles'
const FROM_MEMBER = `JOIN members m ON m.id = member_id AND m.state = 'active' JOIN groups g ON g.id = m.group_id`

const present = (row: Row, via: SignedInMember['via']): SignedInMember => ({
  id: row.id,
  groupId: row.group_id,
  groupName: row.group_name,
  name: row.name,
  email: row.email,
  roles: row.roles,
  via,
})

/** The member whose session this is, if it stands. When it was last seen is written once a minute at most. */
export async function readerBySession(sessionId: string): Promise<SignedInMember | undefined> {
  const [row] = await selectByKey<Row>(
    `SELECT ${MEMBER}, s.id AS via_id, s.last_seen_at < now() - interval '1 minute' AS stale
     FROM sessions s ${FROM_MEMBER} WHERE s.id = $sessionId AND s.ended_at IS NULL AND s.expires_at > now()`,
    { sessionId },
  )
  if (!row) return undefined
  if (row.stale) await change('UPDATE sessions SET last_seen_at = now() WHERE id = $sessionId', { sessionId })
  return present(row, { kind: 'session', sessionId })
}

/** The member whose access token this is the hash of, if it stands. */
export async function readerByToken(hash: string): Promise<SignedInMember | undefined> {
  const [row] = await selectByKey<Row>(
    `SELECT ${MEMBER}, t.id AS via_id, t.scopes, t.last_used_at IS NULL OR t.last_used_at < now() - interval '1 minute' AS stale
     FROM access_tokens t ${FROM_MEMBER} WHERE t.token_hash = $hash AND t.revoked_at IS NULL AND t.expires_at > now()`,
    { hash },
  )
  if (!row) return undefined
  if (row.stale) await change('UPDATE access_tokens SET last_used_at = now() WHERE id = $id', { id: row.via_id })
  return present(row, { kind: 'token', tokenId: row.via_id, scopes: row.scopes })
}
