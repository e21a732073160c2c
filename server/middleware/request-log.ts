import { randomUUID } from 'node:crypto'
import type { RequestHandler } from 'express'
import { log } from '../log.ts'

/** Gives each request an id, which its answer, its problems and its log line carry. */
export const requestLog: RequestHandler = (req, res, next) => {
  const begun = process.hrtime.bigint()
  req.id = randomUUID()
  res.set('X-Request-Id', req.id)
  res.on('finish', () => {
    const milliseconds = Number((process.hrtime.bigint() - begun) / 10_000n) / 100
    log.debug({ requestId: req.id, method: req.method, path: req.originalUrl.split('?', 1)[0], status: res.statusCode, milliseconds }, 'request')
  })
  next()
}
