import { rightsOf } from '../../shared/permissions.ts'
import type { OwnSession, Session as SessionView } from '../../shared/schemas/session.ts'
import type { SignedInMember } from '../middleware/request.ts'
import type { Session } from '../models/session.ts'

/** Who reads, for the client; a reader without account has no member and nothing waiting. */
export const presentReader = (reader: SignedInMember | undefined, counts: SessionView['counts']): SessionView => ({
  member: reader
    ? {
        id: reader.id,
        name: reader.name,
        email: reader.email,
        roles: reader.roles,
        rights: rightsOf(reader.roles),
        group: { id: reader.groupId, name: reader.groupName },
      }
    : null,
  counts,
})

export const presentSession = (session: Session, currentId: string | undefined): OwnSession => ({
  id: session.id,
  current: session.id === currentId,
  address: session.address,
  userAgent: session.userAgent,
  createdAt: session.createdAt.toISOString(),
  lastSeenAt: session.lastSeenAt.toISOString(),
  expiresAt: session.expiresAt.toISOString(),
})
