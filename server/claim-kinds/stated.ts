import type { Transaction } from 'sequelize'
import type { z } from 'zod'
import { intervalOfDigits } from '../../shared/digit-check.ts'
import { MOST_DIGITS, plainDecimal, readDigits } from '../../shared/digit-reading.ts'
import { certifiedRounded, certifiedTruncated, parseDecimal } from '../../shared/digits.ts'
import type { claimInput } from '../../shared/schemas/claim.ts'
import type { Json } from '../audit/canonical.ts'
import { selectOne } from '../db.ts'
import { invalidField } from '../errors.ts'
import { Constant } from '../models/constant.ts'
import type { ClaimContent, ClaimKind } from './claim-kind.ts'
import { constantByNumber } from './constant-by-number.ts'
import { isLess } from './decimal-order.ts'
import { makeStatement } from './statement.ts'

type Input = Extract<z.output<typeof claimInput>, { kind: 'stated' }>
type Value = Input['value']
type Printed = Extract<Value, { digits: string }>

/** An enclosure from elsewhere: printed digits or an interval, with the source that states them. */
export const stated: ClaimKind<Input> = {
  computed: false,
  async content(transaction, _claimant, { constant, value, source }) {
    return contentOf(transaction, await constantByNumber(transaction, 'constant', constant), value, source)
  },
  async renew(transaction, _claimant, claim, patch) {
    const constant = await Constant.findByPk(claim.constantId, { transaction, rejectOnEmpty: true })
    const printed = claim.basis.printed as Printed | undefined
    return contentOf(transaction, constant, printed ?? { lo: claim.lo ?? '', hi: claim.hi ?? '' }, patch.source ?? claim.source ?? '')
  },
  async beforeSigning() {},
  checklist: ({ basis, source }) => [
    { item: 'The source states these digits', detail: source ?? '' },
    ...(basis.printed ? [{ item: `The source means them as ${(basis.printed as unknown as Printed).reading}`, detail: 'The claimed enclosure is every number that is printed so.' }] : []),
    { item: 'The source defines the constant as it is defined here', detail: 'Weight, set, and which of the integers are left out.' },
    { item: 'The source proves the digits', detail: 'Or says how they were computed and with what error.' },
  ],
}

async function contentOf(transaction: Transaction, constant: Constant, value: Value, source: string): Promise<ClaimContent> {
  if (source === '') throw invalidField('source', 'is needed')
  const { lo, hi } = 'digits' in value ? intervalOfPrinted(value) : typedInterval(value)
  const basis: { [key: string]: Json } = 'digits' in value ? { printed: { digits: value.digits, reading: value.reading } } : {}
  const statement = makeStatement({ kind: 'stated', definition: constant.definition as unknown as Json, enclosure: { lo, hi }, source, ...basis })
  return {
    constantId: constant.id,
    otherConstantId: null,
    lo,
    hi,
    digitsTruncated: certifiedTruncated(lo, hi).decimals,
    digitsRounded: certifiedRounded(lo, hi).decimals,
    runId: null,
    basis,
    source,
    repeatedHere: await isRepeated(transaction, constant.id, lo, hi),
    certificate: statement.text,
    certificateDigest: statement.digest,
  }
}

function intervalOfPrinted({ digits, reading }: Printed): { lo: string; hi: string } {
  const result = readDigits(digits)
  if (!result.ok) throw invalidField('value.digits', result.reason)
  if (result.number.uncertainty !== null) {
    throw invalidField('value.digits', 'An uncertainty does not say whether it is a bound. Give the interval that the source proves.')
  }
  return intervalOfDigits(result.number, reading)
}

function typedInterval({ lo, hi }: { lo: string; hi: string }): { lo: string; hi: string } {
  if (isLess(hi, lo)) throw invalidField('value.hi', 'lies below the lower end')
  return { lo: normal(lo, 'value.lo'), hi: normal(hi, 'value.hi') }
}

/** A decimal as it is stored: no leading noughts, no minus before nought. */
function normal(text: string, field: string): string {
  const decimal = parseDecimal(text)
  if (decimal.integer.length + decimal.fraction.length > MOST_DIGITS) throw invalidField(field, `has more than ${MOST_DIGITS.toLocaleString('en')} digits`)
  return plainDecimal({ ...decimal, continues: false, uncertainty: null })
}

/** Whether a run of this installation meets the enclosure. */
async function isRepeated(transaction: Transaction, constantId: string, lo: string, hi: string): Promise<boolean> {
  const run = await selectOne(
    `SELECT 1 AS one FROM runs WHERE constant_id = $constantId AND state = 'done'
     AND (outcome->'enclosure'->>'lo')::numeric <= $hi::numeric AND (outcome->'enclosure'->>'hi')::numeric >= $lo::numeric LIMIT 1`,
    { constantId, lo, hi },
    transaction,
  )
  return run !== undefined
}
