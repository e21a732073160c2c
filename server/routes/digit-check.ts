import { Router } from 'express'
import { checkDigits } from '../../shared/digit-check.ts'
import { readDigits } from '../../shared/digit-reading.ts'
import { digitCheckInput } from '../../shared/schemas/claim.ts'
import { invalidField } from '../errors.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { presentDigitCheck } from '../presenters/digit-check.ts'
import { enclosureToCheck } from '../queries/digit-check.ts'

/** Digits of a manuscript against an enclosure. Changes nothing, and needs no account for what is public. */
export const digitCheck = Router()

const request = { body: digitCheckInput }

digitCheck.post('/', validate(request), async (req: Validated<typeof request>, res) => {
  const { against, text, reading } = req.input
  const enclosure = await enclosureToCheck(req.reader, against)
  const read = readDigits(text)
  if (!read.ok) throw invalidField('text', read.reason)
  res.json(presentDigitCheck(read.number, reading, enclosure, checkDigits(read.number, reading, enclosure.lo, enclosure.hi)))
})
