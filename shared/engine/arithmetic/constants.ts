import { nearestShift } from './integers.ts'

/**
 * ln 2 and pi in fixed point, remembered by precision: a pure function of its argument, so that the memory changes no result.
 * Both are made with 32 bits more than asked for, which cover the truncation of every term.
 */
const GUARD = 32

/**
 * *Claim*: |atanh(1/q) 2^bits - result| <= 2 terms + 1 where terms = bits/(2 log2 q) + 2.
 * *Valid for*: integers q >= 2. *Bound*: A-4. *Rounding*: every quotient is rounded down.
 */
function atanhInverse(q: bigint, bits: number): bigint {
  let power = (1n << BigInt(bits)) / q
  let total = power
  for (let n = 3n; power > 0n; n += 2n) {
    power /= q * q
    total += power / n
  }
  return total
}

/** As `atanhInverse` for atan(1/q): the same series with alternating signs. */
function atanInverse(q: bigint, bits: number): bigint {
  let power = (1n << BigInt(bits)) / q
  let total = power
  let sign = -1n
  for (let n = 3n; power > 0n; n += 2n) {
    power /= q * q
    total += (sign * power) / n
    sign = -sign
  }
  return total
}

function remembered(compute: (bits: number) => bigint): (bits: number) => bigint {
  const known = new Map<number, bigint>()
  return (bits) => {
    let value = known.get(bits)
    if (value === undefined) {
      value = compute(bits)
      known.set(bits, value)
    }
    return value
  }
}

/**
 * *Claim*: |ln 2 - result 2^-bits| <= 2^-bits. *Valid for*: 1 <= bits < 2^20. *Bound*: A-4. *Rounding*: to nearest.
 * ln 2 = 18 atanh(1/26) - 2 atanh(1/4801) + 8 atanh(1/8749), as (27/25)^9 (2400/2401) (4375/4374)^4 = 2.
 */
export const log2Fixed = remembered((bits) => {
  const w = bits + GUARD
  return nearestShift(18n * atanhInverse(26n, w) - 2n * atanhInverse(4801n, w) + 8n * atanhInverse(8749n, w), GUARD)
})

/**
 * *Claim*: |pi - result 2^-bits| <= 2^-bits. *Valid for*: 1 <= bits < 2^20. *Bound*: A-4. *Rounding*: to nearest.
 * pi = 16 atan(1/5) - 4 atan(1/239), for (5+i)^4 (239-i) = 2 (1+i) 2 13^4 up to a positive factor.
 */
export const piFixed = remembered((bits) => {
  const w = bits + GUARD
  return nearestShift(16n * atanInverse(5n, w) - 4n * atanInverse(239n, w), GUARD)
})
