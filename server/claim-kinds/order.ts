import type { Transaction } from 'sequelize'
import type { z } from 'zod'
import { claimNumberText, constantNumberText } from '../../shared/constant-number.ts'
import type { claimInput } from '../../shared/schemas/claim.ts'
import type { Json } from '../audit/canonical.ts'
import { select } from '../db.ts'
import { conflict, invalidField, unprocessable } from '../errors.ts'
import { Constant } from '../models/constant.ts'
import type { ClaimContent, ClaimKind, Claimant, EstimateDoubt } from './claim-kind.ts'
import { constantByNumber } from './constant-by-number.ts'
import { isLess } from './decimal-order.ts'
import { makeStatement } from './statement.ts'

type Input = Extract<z.output<typeof claimInput>, { kind: 'order' }>

/** One side of an order: the constant, its best enclosure when the claim was made, and the signed claims that give it. */
export interface OrderSide {
  constant: string
  text: string
  definition: Json
  enclosure: { lo: string; hi: string }
  claims: { id: string; number: string; certificate: string }[]
}

/** That one constant is less than another, certified by signed enclosures that have no common point and lie in this order. */
export const order: ClaimKind<Input> = {
  computed: false,
  async content(transaction, claimant, { lesser, greater }) {
    const [less, more] = [await constantByNumber(transaction, 'lesser', lesser), await constantByNumber(transaction, 'greater', greater)]
    return contentOf(transaction, claimant, less, more)
  },
  async renew(transaction, claimant, claim) {
    const [less, more] = [await Constant.findByPk(claim.constantId, { transaction, rejectOnEmpty: true }), await Constant.findByPk(claim.otherConstantId ?? '', { transaction, rejectOnEmpty: true })]
    return contentOf(transaction, claimant, less, more)
  },
  async beforeSigning(transaction, claim) {
    const { lesser, greater } = orderOf(claim.basis)
    const fallen = await select<{ id: string }>(
      `SELECT id FROM claims WHERE id = ANY($ids::uuid[]) AND state NOT IN ('signed', 'superseded')`,
      { ids: [...lesser.claims, ...greater.claims].map(({ id }) => id) },
      transaction,
    )
    if (fallen.length > 0) throw conflict('basis_fallen', 'An enclosure that this order rests on is suspended or withdrawn. Return the claim, so that it is put on what stands.')
  },
  checklist: ({ basis }, _outcome, doubts) => {
    const { lesser, greater } = orderOf(basis)
    const side = ({ constant, enclosure, claims }: OrderSide) => ({ item: `${constant} lies in its enclosure`, detail: `[${enclosure.lo}, ${enclosure.hi}] by ${claims.map(({ number }) => number).join(' and ')}.` })
    return [side(lesser), side(greater), { item: 'The enclosures lie in this order', detail: `${lesser.enclosure.hi} < ${greater.enclosure.lo}` }, ...doubts.map(inDoubt)]
  },
}

const inDoubt = ({ estimate, group }: EstimateDoubt) => ({ item: `Estimate ${estimate}`, detail: `An enclosure of the two rests on it. In doubt at ${group}.` })

/** The two sides that an order rests on. */
export const orderOf = (basis: { [key: string]: Json }): { lesser: OrderSide; greater: OrderSide } => basis as unknown as { lesser: OrderSide; greater: OrderSide }

async function contentOf(transaction: Transaction, claimant: Claimant, less: Constant, more: Constant): Promise<ClaimContent> {
  if (less.id === more.id) throw invalidField('greater', 'is the same constant')
  const lesser = await sideOf(transaction, claimant, less, 'lesser')
  const greater = await sideOf(transaction, claimant, more, 'greater')
  if (!isLess(lesser.enclosure.hi, greater.enclosure.lo)) {
    const reversed = isLess(greater.enclosure.hi, lesser.enclosure.lo)
    throw reversed
      ? unprocessable('order_reversed', `The best enclosures certify the contrary: ${more.text} is the lesser.`, 'lesser')
      : unprocessable('order_undecided', 'The best enclosures of the two have common points. Narrower ones may decide the order.', 'greater')
  }
  const basis = { lesser, greater } as unknown as { [key: string]: Json }
  const statement = makeStatement({ kind: 'order', ...basis })
  const repeated = await select<{ repeated_here: boolean }>('SELECT repeated_here FROM claims WHERE id = ANY($ids::uuid[])', { ids: [...lesser.claims, ...greater.claims].map(({ id }) => id) }, transaction)
  return {
    constantId: less.id,
    otherConstantId: more.id,
    lo: null,
    hi: null,
    digitsTruncated: null,
    digitsRounded: null,
    runId: null,
    basis,
    source: null,
    repeatedHere: repeated.every((claim) => claim.repeated_here),
    certificate: statement.text,
    certificateDigest: statement.digest,
  }
}

/** The best enclosure among signed claims that the claimant's group may read, and the claims that give its two ends. */
async function sideOf(transaction: Transaction, claimant: Claimant, constant: Constant, field: string): Promise<OrderSide> {
  const signed = await select<{ id: string; ordinal: number; lo: string; hi: string; certificate_digest: string; has_lo: boolean; has_hi: boolean }>(
    `WITH signed AS (
       SELECT c.id, c.ordinal, c.lo, c.hi, c.certificate_digest FROM claims c JOIN groups g ON g.id = c.group_id
       WHERE c.constant_id = $constantId AND c.state = 'signed' AND c.lo IS NOT NULL AND (g.public OR g.id = $groupId))
     SELECT *, lo = (SELECT max(lo) FROM signed) AS has_lo, hi = (SELECT min(hi) FROM signed) AS has_hi FROM signed ORDER BY ordinal`,
    { constantId: constant.id, groupId: claimant.groupId },
    transaction,
  )
  const [first, last] = [signed.find((claim) => claim.has_lo), signed.find((claim) => claim.has_hi)]
  if (!first || !last) throw unprocessable('no_enclosure', `${constantNumberText(constant.number)} has no signed enclosure in force.`, field)
  return {
    constant: constantNumberText(constant.number),
    text: constant.text,
    definition: constant.definition as unknown as Json,
    enclosure: { lo: first.lo, hi: last.hi },
    claims: [...new Set([first, last])].map((claim) => ({ id: claim.id, number: claimNumberText(constant.number, claim.ordinal), certificate: claim.certificate_digest })),
  }
}
