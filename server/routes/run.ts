import { createSession } from 'better-sse'
import { Router } from 'express'
import { z } from 'zod'
import { id } from '../../shared/schemas/common.ts'
import { runInput, runQuery } from '../../shared/schemas/run.ts'
import { resumeRun, startRun, stopRun } from '../commands/run.ts'
import { conflict } from '../errors.ts'
import { followRun } from '../jobs/run-events.ts'
import { may, readerOf, signedIn, signedInFor } from '../middleware/authenticate.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { Run } from '../models/run.ts'
import { assertCanReadRun, canReadRun } from '../policies/run.ts'
import { presentRun, presentRunSummary } from '../presenters/run.ts'
import { claimsOfRun, findRun, listRuns } from '../queries/run.ts'

export const run = Router()

const creation = { body: runInput }
const list = { query: runQuery }
const one = { params: z.object({ id }) }

async function readable(reader: SignedInMember, runId: string): Promise<Run> {
  const row = await Run.findByPk(runId)
  assertCanReadRun(reader, row)
  return row
}

async function shown(reader: SignedInMember, runId: string) {
  const row = await findRun(runId)
  assertCanReadRun(reader, row && { groupId: row.group_id, startedBy: row.started_by, state: row.state, purpose: row.purpose })
  return presentRun(row!, await claimsOfRun(runId), reader)
}

run.get('/', signedIn, validate(list), async (req: Validated<typeof list>, res) => {
  const { rows, next } = await listRuns(req.member, req.input)
  res.json({ items: rows.map(presentRunSummary), next })
})

run.post('/', signedInFor('run'), may('research'), validate(creation), async (req: Validated<typeof creation>, res) => {
  const started = await startRun(req.member, req.input)
  res.status(201).location(`/api/v1/runs/${started.id}`).json(await shown(req.member, started.id))
})

run.get('/:id', signedIn, validate(one), async (req: Validated<typeof one>, res) => {
  res.json(await shown(req.member, req.input.id))
})

run.get('/:id/events', signedIn, validate(one), async (req: Validated<typeof one>, res) => {
  await readable(req.member, req.input.id)
  const session = await createSession(req, res, { keepAlive: 15_000, headers: { 'X-Accel-Buffering': 'no' } })
  // A stream outlives the request that asked for it: whether it may still be heard is asked before each word.
  await followRun(req.input.id, session, async () => {
    const reader = await readerOf(req)
    const row = await Run.findByPk(req.input.id, { attributes: ['groupId', 'startedBy', 'state', 'purpose'] })
    return reader !== undefined && row !== null && canReadRun(reader, row)
  })
  res.end()
})

run.post('/:id/stop', signedInFor('run'), validate(one), async (req: Validated<typeof one>, res) => {
  await readable(req.member, req.input.id)
  await stopRun(req.member, req.input.id)
  res.json(await shown(req.member, req.input.id))
})

run.post('/:id/resume', signedInFor('run'), validate(one), async (req: Validated<typeof one>, res) => {
  await readable(req.member, req.input.id)
  await resumeRun(req.member, req.input.id)
  res.json(await shown(req.member, req.input.id))
})

run.get('/:id/certificate', signedIn, validate(one), async (req: Validated<typeof one>, res) => {
  const row = await readable(req.member, req.input.id)
  if (row.certificate === null) throw conflict('run_not_done', 'A run has a certificate once it is done.')
  res.set({ ETag: `"${row.certificateDigest}"`, 'Cache-Control': 'private, no-cache', 'Content-Disposition': `attachment; filename="run-${row.id}.json"` })
  res.type('application/json').send(row.certificate)
})
