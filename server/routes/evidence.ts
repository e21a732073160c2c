import { Router } from 'express'
import { z } from 'zod'
import { claimReference } from '../../shared/schemas/claim.ts'
import { id } from '../../shared/schemas/common.ts'
import { attachEvidence, removeEvidence } from '../commands/evidence.ts'
import { assertMayAct } from '../commands/claim-act.ts'
import { notFound } from '../errors.ts'
import { signedInFor } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { Evidence } from '../models/evidence.ts'
import { presentEvidence } from '../presenters/claim.ts'
import { evidenceOf } from '../queries/claim-parts.ts'
import { claimIdFor, readClaim } from '../queries/claim-page.ts'
import { uploadedFile } from './evidence-upload.ts'

/** Files in support of claims: uploaded to a claim, read and removed by their own address. */
export const evidence = Router()

const upload = { params: z.object({ id: claimReference }) }
const one = { params: z.object({ id }) }

evidence.post(
  '/claims/:id/evidence',
  signedInFor('draft'),
  validate(upload),
  // Refused before the file is read, where it would be refused.
  async (req: Validated<typeof upload>, _res, next) => {
    await assertMayAct(req.member, await claimIdFor(req.input.id), 'attach')
    next()
  },
  uploadedFile,
  async (req: Validated<typeof upload>, res) => {
    const claimId = await claimIdFor(req.input.id)
    const fileId = await attachEvidence(req.member, claimId, { name: req.file!.originalname, content: req.file!.buffer })
    const file = (await evidenceOf(claimId)).find((known) => known.id === fileId)!
    res.status(201).location(`/api/v1/evidence/${fileId}`).json(presentEvidence(file))
  },
)

evidence.get('/evidence/:id', validate(one), async (req: Validated<typeof one>, res) => {
  const about = await Evidence.findByPk(req.input.id, { attributes: ['claimId'] })
  if (!about) throw notFound('file')
  await readClaim(req.reader, about.claimId)
  const file = await Evidence.findByPk(req.input.id, { rejectOnEmpty: true })
  res.attachment(file.name)
  // The browser saves it and never shows or runs it: neither by guessing a type nor as a page of ours.
  res.set({ 'Content-Security-Policy': "sandbox; default-src 'none'", 'X-Content-Type-Options': 'nosniff', 'Cache-Control': 'private, no-cache', ETag: `"${file.digest}"` })
  res.set('Content-Type', file.mediaType.startsWith('text/') ? `${file.mediaType}; charset=utf-8` : file.mediaType).send(file.content)
})

evidence.delete('/evidence/:id', signedInFor('draft'), validate(one), async (req: Validated<typeof one>, res) => {
  await removeEvidence(req.member, req.input.id)
  res.status(204).end()
})
