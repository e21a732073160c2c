import { Router } from 'express'
import { z } from 'zod'
import { estimateById, ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { notFound } from '../errors.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { presentEstimate } from '../presenters/estimate.ts'
import { usesOfEstimates } from '../queries/estimate.ts'
import { doubtsOfEstimates } from '../queries/estimate-doubt.ts'

/** The engine's library of published estimates; open to everybody. */
export const estimate = Router()

/** Uses of each estimate that the list names; its own page has more. */
const NEWEST_LISTED = 5

const one = { params: z.object({ id: z.string().max(200) }) }

estimate.get('/', async (req, res) => {
  const ids = ESTIMATES.map(({ id }) => id)
  const [uses, doubts] = await Promise.all([usesOfEstimates(req.reader, ids, NEWEST_LISTED), doubtsOfEstimates(req.reader, ids)])
  res.json({ items: ESTIMATES.map((entry) => presentEstimate(entry, uses, doubts, req.reader)) })
})

estimate.get('/:id', validate(one), async (req: Validated<typeof one>, res) => {
  const entry = estimateById(req.input.id)
  if (!entry) throw notFound('estimate')
  const [uses, doubts] = await Promise.all([usesOfEstimates(req.reader, [entry.id], 500), doubtsOfEstimates(req.reader, [entry.id])])
  res.json(presentEstimate(entry, uses, doubts, req.reader))
})
