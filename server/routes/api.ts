import { Router } from 'express'

/** Everything under /api/v1, one router a resource. */
export function api(): Router {
  const router = Router()
  return router
}
