import type { RequestHandler } from 'express'
import { forbidden } from '../errors.ts'

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * Refuses state-changing requests that another site could have made a browser send. The session cookie is SameSite=Lax; besides,
 * such a request must carry `X-Merestone: 1`, which no form can set and no foreign script may without CORS, which we never grant.
 * A request with a bearer token is not sent by a browser on its own, and needs no header.
 */
export const csrf: RequestHandler = (req, _res, next) => {
  if (SAFE.has(req.method) || req.headers.authorization !== undefined) return next()
  if (req.headers['x-merestone'] !== '1') throw forbidden('cross_site_request', 'Send the header "X-Merestone: 1" with requests that change something.')
  const site = req.headers['sec-fetch-site']
  if (site === 'cross-site' || site === 'same-site') throw forbidden('cross_site_request', 'This request came from another site.')
  next()
}
