import { log2Fixed } from './constants.ts'
import { bitLength, nearestShift } from './integers.ts'

/** Guard bits of the inner computation; A-5 shows that the error inside stays below 2^-8 of the last bit asked for. */
const GUARD = 24
/** The argument is cut into exponents of 2, then into digits of 6 bits each, and a rest below 2^-18. */
const DIGIT_BITS = 6
const DIGITS = 3
/** Bits with which the tables are made beyond those they keep. */
const TABLE_GUARD = 32

interface Tables {
  /** steps[d][i] = exp(i 2^(-6(d+1))) in fixed point, error at most one unit. */
  readonly steps: readonly (readonly bigint[])[]
  /** 1/i! in fixed point, rounded down, as many as the series needs. */
  readonly inverseFactorials: readonly bigint[]
}

const tablesByPrecision = new Map<number, Tables>()

function tables(w: number): Tables {
  let found = tablesByPrecision.get(w)
  if (!found) {
    found = makeTables(w)
    tablesByPrecision.set(w, found)
  }
  return found
}

/** Powers of exp(2^(-6(d+1))), made with 32 bits more, so that 64 truncated products stay below one unit. */
function makeTables(w: number): Tables {
  const wide = w + TABLE_GUARD
  const one = 1n << BigInt(wide)
  const steps = Array.from({ length: DIGITS }, (_, d) => {
    const shift = BigInt(DIGIT_BITS * (d + 1))
    let base = one
    let term = one
    for (let n = 1n; term > 0n; n++) {
      term = (term >> shift) / n
      base += term
    }
    const row = [one]
    for (let i = 1; i < 1 << DIGIT_BITS; i++) row.push((row[i - 1] * base) >> BigInt(wide))
    return row.map((value) => nearestShift(value, TABLE_GUARD))
  })
  const inverseFactorials = [1n << BigInt(w)]
  // |r| < 2^-18: the term n is below 2^(-18 n) / n!, and the series stops where that is below 2^-w.
  for (let n = 1; inverseFactorials[n - 1] >> BigInt(DIGIT_BITS * DIGITS * (n - 1)) > 0n; n++) {
    inverseFactorials.push(inverseFactorials[n - 1] / BigInt(n))
  }
  return { steps, inverseFactorials }
}

/** e^x = mantissa 2^(exponent - precision) up to the error stated where it is made. */
export interface Scaled {
  readonly mantissa: bigint
  readonly exponent: number
}

/**
 * *Claim*: |e^(x 2^-p) - m 2^(e-p)| <= 2^(e-p), and 2^(p-1) < m < 2^(p+2).
 * *Valid for*: 8 <= p < 2^19, |x| < 2^(p+40). *Bound*: A-5. *Rounding*: the last shift is to nearest, all others down.
 */
export function expFixed(x: bigint, p: number): Scaled {
  const extra = Math.max(0, bitLength(x) - p)
  if (extra > 40) throw new RangeError('argument of exp out of range')
  // In steps of 16, so that few tables are made.
  const guard = GUARD + 16 * Math.ceil(extra / 16)
  const w = p + guard
  const wide = BigInt(w)
  const { steps, inverseFactorials } = tables(w)
  const log2 = log2Fixed(w)
  const scaled = x << BigInt(guard)
  let exponent = scaled / log2
  if (scaled < 0n) exponent -= 1n
  let rest = scaled - exponent * log2
  let product = 0n
  for (let d = 0; d < DIGITS; d++) {
    const shift = BigInt(w - DIGIT_BITS * (d + 1))
    const digit = rest >> shift
    rest -= digit << shift
    const step = steps[d][Number(digit)]
    product = d === 0 ? step : (product * step) >> wide
  }
  let n = inverseFactorials.length - 1
  let series = inverseFactorials[n]
  while (n > 0) series = inverseFactorials[--n] + ((series * rest) >> wide)
  return { mantissa: nearestShift(product * series, w + guard), exponent: Number(exponent) }
}
