import type { Request, RequestHandler } from 'express'
import { hasRight, type Right } from '../../shared/permissions.ts'
import type { TokenScope } from '../../shared/schemas/session.ts'
import { sessionOfCookie } from '../auth/session-cookie.ts'
import { tokenHash } from '../auth/tokens.ts'
import { forbidden, Problem, unauthenticated } from '../errors.ts'
import { readerBySession, readerByToken } from '../queries/reader.ts'
import type { SignedInMember } from './request.ts'

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS'])

/** The member whose access token or session cookie a request carries, as things stand at this moment. */
export async function readerOf({ headers }: Request): Promise<SignedInMember | undefined> {
  if (headers.authorization !== undefined) {
    const bearer = /^Bearer +(\S+)$/i.exec(headers.authorization)?.[1]
    return bearer === undefined ? undefined : readerByToken(tokenHash(bearer))
  }
  const sessionId = sessionOfCookie(headers.cookie)
  return sessionId === undefined ? undefined : readerBySession(sessionId)
}

/**
 * Finds out who asks: `req.member`, and `req.reader`, whose eyes a request reads with. Without cookie or token, and with an access token
 * that lacks the scope "read", that is a reader without account.
 */
export const authenticate: RequestHandler = async (req, _res, next) => {
  const member = await readerOf(req)
  if (!member && req.headers.authorization !== undefined) {
    throw new Problem(401, 'token_refused', 'This access token is unknown, expired or revoked. Make a new one on your account page.', { headers: { 'WWW-Authenticate': 'Bearer error="invalid_token"' } })
  }
  Object.defineProperty(req, 'member', {
    configurable: true,
    get: () => {
      if (!member) throw unauthenticated()
      return member
    },
  })
  req.reader = member && mayRead(member) ? member : undefined
  next()
}

/** Whether what is open to the member is open to this request of theirs. */
export const mayRead = ({ via }: SignedInMember): boolean => via.kind === 'session' || via.scopes.includes('read')

/** Who may send a request, as the description of the API tells it. */
export interface AccessMark {
  access: 'session' | 'reading' | TokenScope
}

const marked = (access: AccessMark['access'], check: RequestHandler): RequestHandler & AccessMark => Object.assign(check, { access })

/** The request must come from a member: by session, or for reading by an access token with the scope "read". */
export const signedIn = marked('reading', (req, _res, next) => {
  const { via } = req.member
  if (via.kind === 'token') {
    if (!SAFE.has(req.method)) throw forbidden('session_needed', 'This cannot be done with an access token. Sign in.')
    requireScope(via.scopes, 'read')
  }
  next()
})

/** As `signedIn`, and open to access tokens with this scope. */
export const signedInFor = (scope: TokenScope) =>
  marked(scope, (req, _res, next) => {
    const { via } = req.member
    if (via.kind === 'token') requireScope(via.scopes, scope)
    next()
  })

/** The request must come from a member who is signed in by password: what concerns the account itself. */
export const signedInByPassword = marked('session', (req, _res, next) => {
  if (req.member.via.kind !== 'session') throw forbidden('session_needed', 'This cannot be done with an access token. Sign in.')
  next()
})

/** One of the member's roles must carry the right. Whether it covers the thing at hand is for the policies, on the loaded row. */
export const may = (right: Right): RequestHandler => (req, _res, next) => {
  if (!hasRight(req.member.roles, right)) throw forbidden('role_needed', 'Your roles do not allow this. A lead of your group can change them.')
  next()
}

function requireScope(scopes: string[], scope: TokenScope): void {
  if (!scopes.includes(scope)) throw forbidden('scope_needed', `This access token lacks the scope "${scope}".`)
}
