import { existsSync } from 'node:fs'
import { extname, join } from 'node:path'
import express, { Router, type RequestHandler } from 'express'

/** Answers with the gzip that the build has put beside a file, to whoever takes it. */
const preferGzip = (folder: string): RequestHandler => (req, res, next) => {
  const isThere = /^\/[\w.-]+$/.test(req.path) && existsSync(join(folder, `${req.path}.gz`))
  if (!isThere) return next()
  res.vary('Accept-Encoding')
  if (!req.acceptsEncodings('gzip')) return next()
  res.set('Content-Encoding', 'gzip').type(extname(req.path))
  req.url = `${req.path}.gz`
  next()
}

/** Serves the files of the built client, hashed assets for good. Its page is for pages/pages.ts to fill, and has no address of its own. */
export function staticClient(folder: string): Router {
  const router = Router()
  const assets = join(folder, 'assets')
  router.use('/assets', preferGzip(assets), express.static(assets, { immutable: true, maxAge: '1y', index: false, fallthrough: false }))
  router.get('/index.html', (_req, _res, next) => next('router'))
  router.use(express.static(folder, { index: false, maxAge: 0 }))
  return router
}
