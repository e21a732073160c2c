import type { Request } from 'express'
import type { Origin } from '../commands/session.ts'

/** Where the request came from, for the list of one's sessions and for the throttle. */
export const originOf = (req: Request): Origin => ({ address: req.ip ?? 'unknown', userAgent: req.headers['user-agent'] ?? '' })
