import { type GMPFunctions, init, mpfr_rnd_t } from 'gmp-wasm'
import { beforeAll, describe, expect, it } from 'vitest'
import { log2Fixed, piFixed } from '../../shared/engine/arithmetic/constants.ts'
import { expFixed } from '../../shared/engine/arithmetic/exponential.ts'
import { logFixed } from '../../shared/engine/arithmetic/logarithm.ts'
import { Random } from '../support/random.ts'

/**
 * exp and log against GNU MPFR (npm gmp-wasm), whose results are correctly rounded: the reference is taken with 64 bits more
 * and rounded down and up, and the stated error of one unit (A-4, A-5, A-6 of BOUNDS.md) is checked from both ends.
 */
const random = new Random()
const ARGUMENTS = 50_000
const PRECISIONS = [64, 113, 200, 301]

let g: GMPFunctions
beforeAll(async () => {
  g = (await init()).binding
})

type Apply = (g: GMPFunctions, to: number, from: number, direction: mpfr_rnd_t) => void

/** Floor and ceiling of function(argument 2^-p) 2^(p + extra), from MPFR. */
function reference(apply: Apply, argument: bigint | null, p: number, extra: number): [bigint, bigint] {
  const bits = Math.max(p + extra + 96, argument === null ? 0 : argument.toString(2).length + 8)
  const [x, y, z] = [g.mpfr_t(), g.mpfr_t(), g.mpz_t()]
  g.mpfr_init2(x, bits)
  g.mpfr_init2(y, bits)
  g.mpz_init(z)
  if (argument !== null) {
    g.mpz_set_string(z, argument.toString(16), 16)
    g.mpfr_set_z_2exp(x, z, -p, mpfr_rnd_t.MPFR_RNDN)
  }
  const ends = [mpfr_rnd_t.MPFR_RNDD, mpfr_rnd_t.MPFR_RNDU].map((direction) => {
    apply(g, y, x, direction)
    g.mpfr_mul_2si(y, y, p + extra, direction)
    g.mpfr_get_z(z, y, direction)
    const text = g.mpz_to_string(z, 16)
    return text.startsWith('-') ? -BigInt(`0x${text.slice(1)}`) : BigInt(`0x${text}`)
  })
  g.mpfr_clear(x)
  g.mpfr_clear(y)
  g.mpz_clear(z)
  g.mpfr_t_free(x)
  g.mpfr_t_free(y)
  g.mpz_t_free(z)
  return [ends[0], ends[1]]
}

const EXTRA = 64
const UNIT = 1n << BigInt(EXTRA)

/** Whether value (in units of 2^-p) is within one unit of everything in the reference (in units of 2^-(p + EXTRA)). */
function withinOneUnit(value: bigint, [lo, hi]: [bigint, bigint]): boolean {
  const fine = value * UNIT
  return fine - lo <= UNIT && hi - fine <= UNIT
}

describe('elementary functions on random arguments, held against MPFR', () => {
  it.each(PRECISIONS)('log is within the stated unit at %i bits', (p) => {
    for (let i = 0; i < ARGUMENTS / PRECISIONS.length; i++) {
      const x = random.big(random.whole(1, 2 * p)) + 1n
      const expected = reference((lib, to, from, d) => lib.mpfr_log(to, from, d), x, p, EXTRA)
      if (!withinOneUnit(logFixed(x, p), expected)) expect.fail(`log(${x} 2^-${p}), seed ${random.seed}`)
    }
  })

  it.each(PRECISIONS)('exp is within the stated unit at %i bits', (p) => {
    for (let i = 0; i < ARGUMENTS / PRECISIONS.length; i++) {
      const x = random.signed(p + random.whole(-10, 9))
      const { mantissa, exponent } = expFixed(x, p)
      const expected = reference((lib, to, from, d) => lib.mpfr_exp(to, from, d), x, p, EXTRA - exponent)
      if (!withinOneUnit(mantissa, expected)) expect.fail(`exp(${x} 2^-${p}), seed ${random.seed}`)
      if (mantissa <= 1n << BigInt(p - 1) || mantissa >= 1n << BigInt(p + 2)) expect.fail(`mantissa of exp(${x} 2^-${p})`)
    }
  })

  it('log 2 and pi are within the stated unit, from 8 to 4000 bits', () => {
    for (const p of [8, 9, 31, 64, 100, 333, 1000, 4000]) {
      expect(withinOneUnit(log2Fixed(p), reference((lib, to, _, d) => lib.mpfr_const_log2(to, d), null, p, EXTRA))).toBe(true)
      expect(withinOneUnit(piFixed(p), reference((lib, to, _, d) => lib.mpfr_const_pi(to, d), null, p, EXTRA))).toBe(true)
    }
  })

  it('corners: arguments at powers of two, next to 1, and next to multiples of log 2', () => {
    const p = 150
    const one = 1n << 150n
    const nearOne = [0n, 1n, 2n, 2n ** 30n, 2n ** 100n].flatMap((d) => [one + d, one - d])
    for (const x of [1n, 2n, 3n, one << 200n, (one << 200n) - 1n, ...nearOne]) {
      expect(withinOneUnit(logFixed(x, p), reference((lib, to, from, d) => lib.mpfr_log(to, from, d), x, p, EXTRA)), `log ${x}`).toBe(true)
    }
    const log2 = log2Fixed(p)
    for (const k of [-1000n, -2n, -1n, 0n, 1n, 2n, 999n]) {
      for (const d of [-1n, 0n, 1n]) {
        const x = k * log2 + d
        const { mantissa, exponent } = expFixed(x, p)
        const expected = reference((lib, to, from, dir) => lib.mpfr_exp(to, from, dir), x, p, EXTRA - exponent)
        expect(withinOneUnit(mantissa, expected), `exp ${x}`).toBe(true)
      }
    }
  })
})
