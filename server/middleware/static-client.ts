import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import express, { Router } from 'express'

/** Serves the built client: hashed assets for good, and its page under every address that is not a file, so that history routes work. */
export function staticClient(folder: string): Router {
  const router = Router()
  const page = join(folder, 'index.html')
  router.use('/assets', express.static(join(folder, 'assets'), { immutable: true, maxAge: '1y', index: false, fallthrough: false }))
  router.use(express.static(folder, { index: false, maxAge: 0 }))
  router.get(/.*/, (req, res, next) => {
    if (!existsSync(page)) return next()
    if (!req.accepts('html')) return next()
    res.set('Cache-Control', 'no-cache').type('html').send(readFileSync(page))
  })
  return router
}
