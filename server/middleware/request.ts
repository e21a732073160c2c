import type { Role } from '../../shared/permissions.ts'

/** Who a request comes from, as told by the session cookie or a personal access token. */
export interface SignedInMember {
  id: string
  groupId: string
  groupName: string
  name: string
  email: string
  roles: Role[]
  via: { kind: 'session'; sessionId: string } | { kind: 'token'; tokenId: string; scopes: string[] }
}

declare global {
  // The only way to add a property to Express's request type.
  // eslint-disable-next-line @typescript-eslint/no-namespace
  namespace Express {
    interface Request {
      id: string
      /** Set by `validate`; handlers type it by taking `Validated<typeof schemas>` for their request. */
      // eslint-disable-next-line @typescript-eslint/no-explicit-any
      input: any
      /** The member, or undefined for a reader without account and for an access token that may not read. */
      reader: SignedInMember | undefined
      /** The member; reading it on a request that is not signed in answers 401. */
      readonly member: SignedInMember
    }
  }
}
