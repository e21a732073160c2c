import { Router } from 'express'
import { z } from 'zod'
import { claimInput, claimPatch, claimQuery, claimReference, verdictDraft } from '../../shared/schemas/claim.ts'
import { keepVerdictDraft } from '../commands/assignment.ts'
import { deleteClaim } from '../commands/claim-act.ts'
import { draftClaim, editClaim } from '../commands/claim.ts'
import { may, signedIn, signedInFor } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { presentClaimSummary } from '../presenters/claim.ts'
import { certificateOf } from '../queries/claim-certificate.ts'
import { listClaims } from '../queries/claim.ts'
import { claimDetail, claimIdFor, readClaim } from '../queries/claim-page.ts'

/** Claims. What is signed and published is open to everybody; the acts of a claim's life are in claim-act.ts. */
export const claim = Router()

const params = z.object({ id: claimReference })
const list = { query: claimQuery }
const creation = { body: claimInput }
const one = { params }
const patch = { params, body: claimPatch }
const draft = { params, body: verdictDraft }

claim.get('/', validate(list), async (req: Validated<typeof list>, res) => {
  const { rows, next } = await listClaims(req.reader, req.input)
  res.json({ items: rows.map(presentClaimSummary), next })
})

claim.post('/', signedInFor('draft'), may('research'), validate(creation), async (req: Validated<typeof creation>, res) => {
  const { id } = await draftClaim(req.member, req.input)
  res.status(201).location(`/api/v1/claims/${id}`).json(await claimDetail(req.member, id))
})

claim.get('/:id', validate(one), async (req: Validated<typeof one>, res) => {
  res.set('Cache-Control', 'no-cache').json(await claimDetail(req.reader, req.input.id))
})

claim.patch('/:id', signedInFor('draft'), validate(patch), async (req: Validated<typeof patch>, res) => {
  const id = await claimIdFor(req.input.id)
  await editClaim(req.member, id, req.input)
  res.json(await claimDetail(req.member, id))
})

claim.delete('/:id', signedInFor('draft'), validate(one), async (req: Validated<typeof one>, res) => {
  await deleteClaim(req.member, await claimIdFor(req.input.id))
  res.status(204).end()
})

claim.put('/:id/verdict-draft', signedIn, validate(draft), async (req: Validated<typeof draft>, res) => {
  await keepVerdictDraft(req.member, await claimIdFor(req.input.id), req.input.text)
  res.status(204).end()
})

claim.get('/:id/certificate', validate(one), async (req: Validated<typeof one>, res) => {
  const { row } = await readClaim(req.reader, req.input.id)
  const { text, etag, name } = await certificateOf(row)
  res.set({ ETag: etag, 'Cache-Control': 'no-cache', 'Content-Disposition': `attachment; filename="${name}.json"` })
  res.type('application/json').send(text)
})
