import { rateLimit as limiter } from 'express-rate-limit'
import type { RequestHandler } from 'express'
import { tooMany } from '../errors.ts'

/**
 * At most `perMinute` requests a minute from one address (an IPv6 network of 56 bits counts as one). Counted in memory, a guard
 * against floods; what must outlive a restart, such as failed sign-ins, is counted in the database.
 */
export function rateLimit(perMinute: number): RequestHandler {
  return limiter({
    windowMs: 60_000,
    limit: perMinute,
    standardHeaders: 'draft-7',
    legacyHeaders: false,
    ipv6Subnet: 56,
    handler: (_req, _res, next) => next(tooMany(60, 'Too many requests from your address. Wait a minute.')),
  })
}
