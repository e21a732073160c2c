import { Router } from 'express'
import { z } from 'zod'
import type { Estimate } from '../../shared/engine/estimates/estimate.ts'
import { estimateById } from '../../shared/engine/estimates/library.ts'
import { doubtInput, liftInput } from '../../shared/schemas/estimate.ts'
import { liftDoubt, markInDoubt } from '../commands/estimate-doubt.ts'
import { notFound } from '../errors.ts'
import { may, signedIn } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { presentEstimateDoubt } from '../presenters/estimate-doubt.ts'
import { claimsOnEstimate, constantsToRunAgain, openDoubt } from '../queries/estimate-doubt.ts'

/** What rests on an estimate in a lead's group, and the group's doubt about it. */
export const estimateDoubt = Router()

const one = { params: z.object({ id: z.string().max(200) }) }
const marking = { ...one, body: doubtInput }
const lifting = { ...one, body: liftInput }

function entryOf(id: string): Estimate {
  const entry = estimateById(id)
  if (!entry) throw notFound('estimate')
  return entry
}

async function shown(groupId: string, entry: Estimate) {
  const [doubt, claims] = [await openDoubt(groupId, entry.id), await claimsOnEstimate(groupId, entry.id)]
  const touched = claims.flatMap(({ id, through }) => [id, ...through.map((claim) => claim.id)])
  return presentEstimateDoubt(entry, doubt, claims, await constantsToRunAgain(groupId, entry.id, touched, doubt?.marked_at ?? null))
}

estimateDoubt.get('/:id/doubt', signedIn, may('estimates.doubt'), validate(one), async (req: Validated<typeof one>, res) => {
  res.json(await shown(req.member.groupId, entryOf(req.input.id)))
})

estimateDoubt.post('/:id/doubt', signedIn, may('estimates.doubt'), validate(marking), async (req: Validated<typeof marking>, res) => {
  const entry = entryOf(req.input.id)
  await markInDoubt(req.member, entry, req.input)
  res.status(201).json(await shown(req.member.groupId, entry))
})

estimateDoubt.post('/:id/doubt/lift', signedIn, may('estimates.doubt'), validate(lifting), async (req: Validated<typeof lifting>, res) => {
  const entry = entryOf(req.input.id)
  const result = await liftDoubt(req.member, entry, req.input)
  res.json({ ...result, now: await shown(req.member.groupId, entry) })
})
