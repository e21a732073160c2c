import { Router } from 'express'
import { selectOne } from '../db.ts'

/** Whether this process is up, and whether it reaches the database: for supervisors and load balancers. */
export const health = Router()

health.get('/live', (_req, res) => {
  res.set('Cache-Control', 'no-store').json({ status: 'up' })
})

health.get('/ready', async (_req, res) => {
  await selectOne('SELECT 1 AS one')
  res.set('Cache-Control', 'no-store').json({ status: 'ready' })
})
