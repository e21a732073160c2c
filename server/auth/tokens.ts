import { createHash, randomBytes } from 'node:crypto'

/** A token that cannot be guessed: 256 random bits, safe in an address. */
export const newToken = (prefix = ''): string => prefix + randomBytes(32).toString('base64url')

/** What the database keeps of a token. It is random, so a plain hash cannot be searched. */
export const tokenHash = (token: string): string => createHash('sha256').update(token).digest('hex')
