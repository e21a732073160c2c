import type { z } from 'zod'
import { parseConstantNumber } from '../../shared/constant-number.ts'
import type { digitCheckInput } from '../../shared/schemas/claim.ts'
import { isLess } from '../claim-kinds/decimal-order.ts'
import { forbidden, invalidField, notFound, unprocessable } from '../errors.ts'
import { mayCheckDigits } from '../policies/claim.ts'
import type { Reader } from './audience.ts'
import { readClaim } from './claim-page.ts'
import { findConstant } from './constant.ts'

type Against = z.output<typeof digitCheckInput>['against']

/** The enclosure that digits are held against, where it is open to the reader for that. */
export async function enclosureToCheck(reader: Reader, against: Against): Promise<{ lo: string; hi: string }> {
  if ('claim' in against) return enclosureOfClaim(reader, against.claim)
  if ('constant' in against) return bestOfConstant(reader, against.constant)
  const { lo, hi } = against.enclosure
  if (isLess(hi, lo)) throw invalidField('against.enclosure.hi', 'lies below the lower end')
  return { lo, hi }
}

async function enclosureOfClaim(reader: Reader, reference: string): Promise<{ lo: string; hi: string }> {
  const { row, standing } = await readClaim(reader, reference)
  if (!mayCheckDigits({ signedAt: row.signed_at, groupPublic: row.group_public }, standing)) throw forbidden('not_assigned', 'Digits are checked against a claim in review by its referees, and against one that is signed by everybody.')
  if (row.lo === null || row.hi === null) throw unprocessable('no_enclosure', 'This claim states an order and has no digits of its own.', 'against.claim')
  return { lo: row.lo, hi: row.hi }
}

async function bestOfConstant(reader: Reader, text: string): Promise<{ lo: string; hi: string }> {
  const number = parseConstantNumber(text)
  if (number === null) throw invalidField('against.constant', 'there is no such constant')
  const row = await findConstant(reader, number)
  if (!row) throw notFound('constant')
  if (row.best_lo === null || row.best_hi === null) throw unprocessable('no_enclosure', 'This constant has no signed enclosure yet.', 'against.constant')
  return { lo: row.best_lo, hi: row.best_hi }
}
