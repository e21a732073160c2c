import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { Router } from 'express'
import { z } from 'zod'
import { parseConstantNumber } from '../../shared/constant-number.ts'
import { constantNumber } from '../../shared/schemas/common.ts'
import { constantExportQuery, constantInput, constantQuery } from '../../shared/schemas/constant.ts'
import { stateConstant } from '../commands/constant.ts'
import { inTransaction } from '../db.ts'
import { readDefinition } from '../engine/definition.ts'
import { notFound } from '../errors.ts'
import { may, signedInFor } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { exportConstants, exportFile } from '../presenters/constant-export.ts'
import { presentConstantSummary } from '../presenters/constant.ts'
import { allConstants, listConstants } from '../queries/constant.ts'
import { constantDetail } from '../queries/constant-page.ts'

/** The register: open to everybody, each to what is open to them. */
export const constant = Router()

const list = { query: constantQuery }
const file = { query: constantExportQuery }
const creation = { body: constantInput }
const one = { params: z.object({ number: constantNumber }) }

constant.get('/', validate(list), async (req: Validated<typeof list>, res) => {
  const { rows, next, total } = await listConstants(req.reader, req.input)
  res.json({ items: rows.map(presentConstantSummary), next, ...(total !== undefined && { total }) })
})

constant.get('/export', validate(file), async (req: Validated<typeof file>, res) => {
  const { format, ...query } = req.input
  const pages = allConstants(req.reader, query)
  // A filter that makes no sense is refused before anything is sent.
  const first = await pages.next()
  const { type, name } = exportFile(format)
  res.set({ 'Content-Type': type, 'Content-Disposition': `attachment; filename="${name}"`, 'Cache-Control': 'no-cache' })
  await pipeline(Readable.from(exportConstants(first, pages, format)), res).catch((error: NodeJS.ErrnoException) => {
    // Whoever does not want the rest of the file goes away.
    if (error.code !== 'ERR_STREAM_PREMATURE_CLOSE') throw error
  })
})

constant.post('/', signedInFor('draft'), may('research'), validate(creation), async (req: Validated<typeof creation>, res) => {
  const read = readDefinition(req.input.definition)
  const { constant: row, created } = await inTransaction((transaction) => stateConstant(transaction, req.member, read))
  res.status(created ? 201 : 200).json(await constantDetail(req.member, row.number))
})

constant.get('/:number', validate(one), async (req: Validated<typeof one>, res) => {
  const detail = await constantDetail(req.reader, parseConstantNumber(req.input.number) ?? 0)
  if (!detail) throw notFound('constant')
  res.json(detail)
})
