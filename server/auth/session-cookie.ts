import { createSecretKey, randomBytes } from 'node:crypto'
import type { Response } from 'express'
import jwt from 'jsonwebtoken'
import { dataPath, secretFile } from '../data-folder.ts'
import { env } from '../env.ts'

/** The prefix makes browsers insist on a secure cookie of this very host. */
export const COOKIE = env.secureCookies ? '__Host-merestone' : 'merestone'

// A key object, made once: from a text the key would be made anew, and guessed at, with every request.
const secret = createSecretKey(Buffer.from(env.SESSION_SECRET ?? secretFile(dataPath('session-secret'), () => randomBytes(48).toString('base64url'))))

const options = { httpOnly: true, sameSite: 'lax', secure: env.secureCookies, path: '/' } as const

/** Gives the browser a signed cookie that names the session; whether the session still stands is told by its row. */
export function setSessionCookie(res: Response, sessionId: string, expiresAt: Date): void {
  const token = jwt.sign({ sid: sessionId, exp: Math.floor(expiresAt.getTime() / 1000) }, secret, { algorithm: 'HS256' })
  res.cookie(COOKIE, token, { ...options, expires: expiresAt })
}

export function clearSessionCookie(res: Response): void {
  res.clearCookie(COOKIE, options)
}

/** The session that a Cookie header names, or undefined if there is none or it was forged or has expired. */
export function sessionOfCookie(header: string | undefined): string | undefined {
  const pair = header?.split(';').find((part) => part.trim().startsWith(`${COOKIE}=`))
  if (pair === undefined) return undefined
  try {
    const payload = jwt.verify(pair.slice(pair.indexOf('=') + 1).trim(), secret, { algorithms: ['HS256'] })
    return typeof payload === 'object' && typeof payload.sid === 'string' ? payload.sid : undefined
  } catch {
    return undefined
  }
}
