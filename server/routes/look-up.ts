import { Router } from 'express'
import { plainDecimal, readDigits } from '../../shared/digit-reading.ts'
import { lookUpInput } from '../../shared/schemas/constant.ts'
import { invalidField } from '../errors.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { placeBeside, presentLookUp } from '../presenters/look-up.ts'
import { constantsById } from '../queries/constant.ts'
import { leadingDigits } from '../queries/leading-digits.ts'
import { constantsNear } from '../queries/look-up.ts'

/** Which constant may these digits be? Open to everybody, on what is open to them. */
export const lookUp = Router()

const asked = { body: lookUpInput }

lookUp.post('/', validate(asked), async (req: Validated<typeof asked>, res) => {
  const read = readDigits(req.input.text)
  if (!read.ok) throw invalidField('text', read.reason)
  const [lo, hi] = leadingDigits(plainDecimal(read.number))
  const placed = placeBeside(read.number, req.input.reading, await constantsNear(req.reader, lo, hi))
  res.json({ items: presentLookUp(read.number, placed, await constantsById(req.reader, placed.map(({ id }) => id))) })
})
