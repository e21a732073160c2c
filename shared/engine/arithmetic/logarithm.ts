import { log2Fixed } from './constants.ts'
import { bitLength, floorShift, nearestShift } from './integers.ts'

/** Guard bits of the inner computation; A-6 shows that the error inside stays below 2^-8 of the last bit asked for. */
const GUARD = 32
/**
 * y in [i, i+1)/2^7 times FIRST[i - 128]/2^8 is 1 + v with |v| < 2^-7; 1 + v with v in [j, j+1)/2^13 times
 * SECOND[j + 65]/2^16 is 1 + v' with |v'| < 2^-13 (A-6: checked for each of the finitely many factors).
 */
const FIRST_BITS = 7
const SECOND_BITS = 13
const FIRST = Array.from({ length: 128 }, (_, i) => ((1n << 17n) / BigInt(2 * (i + 128) + 1) + 1n) / 2n)
const SECOND = Array.from({ length: 131 }, (_, j) => (1n << 30n) / BigInt(2 ** 14 + 2 * (j - 65) + 1))

interface Tables {
  readonly first: Map<number, bigint>
  readonly second: Map<number, bigint>
  /** 1/(2i+1) in fixed point, rounded down. */
  readonly inverseOdd: bigint[]
}

const tablesByPrecision = new Map<number, Tables>()

function tables(w: number): Tables {
  let found = tablesByPrecision.get(w)
  if (!found) {
    // |s| < 2^-13.9: the term i is below 2^(-27 i - 13) / (2i+1).
    const terms = Math.ceil(w / 27) + 1
    const one = 1n << BigInt(w)
    found = { first: new Map(), second: new Map(), inverseOdd: Array.from({ length: terms }, (_, i) => one / BigInt(2 * i + 1)) }
    tablesByPrecision.set(w, found)
  }
  return found
}

/**
 * *Claim*: |log(n / 2^bits) 2^w - result| <= 1. *Valid for*: 2^(bits-1) <= n <= 2^(bits+1). *Bound*: A-6.
 * By 2 atanh(z), z = (n - 2^bits)/(n + 2^bits) exact, |z| <= 1/3, with 32 bits more for the truncated terms.
 */
function logOfRatio(n: bigint, bits: number, w: number): bigint {
  const one = 1n << BigInt(bits)
  const [top, bottom] = [n - one, n + one]
  const [topSquare, bottomSquare] = [top * top, bottom * bottom]
  let power = (top << BigInt(w + GUARD + 1)) / bottom
  let total = power
  for (let i = 3n; power !== 0n; i += 2n) {
    power = (power * topSquare) / bottomSquare
    total += power / i
  }
  return nearestShift(total, GUARD)
}

function lookUp(table: Map<number, bigint>, key: number, make: () => bigint): bigint {
  let value = table.get(key)
  if (value === undefined) {
    value = make()
    table.set(key, value)
  }
  return value
}

/**
 * *Claim*: |log(x 2^-p) - result 2^-p| <= 2^-p.
 * *Valid for*: x > 0, p >= 8, bitLength(x) <= 2^19, 8 <= p < 2^19. *Bound*: A-6. *Rounding*: the last shift is to nearest.
 */
export function logFixed(x: bigint, p: number): bigint {
  if (x <= 0n) throw new RangeError('logarithm of a number that is not positive')
  const w = p + GUARD
  const wide = BigInt(w)
  const { first, second, inverseOdd } = tables(w)
  const top = bitLength(x) - 1
  const y = floorShift(x, top - w)
  const one = 1n << wide

  const i = Number(y >> BigInt(w - FIRST_BITS)) - 128
  const c = FIRST[i]
  let z = (y * c) >> 8n
  let total = BigInt(top - p) * log2Fixed(w) - lookUp(first, i, () => logOfRatio(c, 8, w))

  const j = Number((z - one) >> BigInt(w - SECOND_BITS)) + 65
  const d = SECOND[j]
  z = (z * d) >> 16n
  total -= lookUp(second, j, () => logOfRatio(d, 16, w))

  const v = z - one
  const s = (v << wide) / (z + one)
  const square = (s * s) >> wide
  let n = inverseOdd.length - 1
  let series = inverseOdd[n]
  while (n > 0) series = inverseOdd[--n] + ((series * square) >> wide)
  return nearestShift(total + ((s * series) >> BigInt(w - 1)), GUARD)
}
