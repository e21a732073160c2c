import { Router } from 'express'
import { z } from 'zod'
import { estimateById, ESTIMATES } from '../../shared/engine/estimates/library.ts'
import { notFound } from '../errors.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { presentEstimate } from '../presenters/estimate.ts'
import { usesOfEstimates } from '../queries/estimate.ts'

/** The engine's library of published estimates; open to everybody. */
export const estimate = Router()

const one = { params: z.object({ id: z.string().max(200) }) }

estimate.get('/', async (req, res) => {
  const uses = await usesOfEstimates(req.reader, ESTIMATES.map(({ id }) => id), 20)
  res.json({ items: ESTIMATES.map((entry) => presentEstimate(entry, uses)) })
})

estimate.get('/:id', validate(one), async (req: Validated<typeof one>, res) => {
  const entry = estimateById(req.input.id)
  if (!entry) throw notFound('estimate')
  res.json(presentEstimate(entry, await usesOfEstimates(req.reader, [entry.id], 500)))
})
