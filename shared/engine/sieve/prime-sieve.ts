import { primesUpTo } from '../arithmetic/primes.ts'
import { floorSqrt } from './integer-root.ts'
import { BIT_OF, RESIDUES, WHEEL, clipByte } from './wheel.ts'

/** Segments start at multiples of this many bytes, so that their readers can rely on aligned cells. */
export const SEGMENT_ALIGNMENT = 1024

/** Largest end of a sieved range: every product formed below stays an exact integer below 2^53. */
export const SIEVE_LIMIT = 1e15

export interface SieveOptions {
  /** Keep only the numbers n = residue (mod modulus). */
  residueClass?: { modulus: number; residue: number }
  /** A multiple of SEGMENT_ALIGNMENT; by default what suits the caches. heuristic: affects speed only */
  segmentBytes?: number
}

/** Multiples of these are struck by copying a pattern whose period is their product in bytes. */
const PATTERN_PRIMES = [7, 11, 13, 17]
const PATTERN_PERIOD = 7 * 11 * 13 * 17

let patternMemory = new Uint8Array(0)

/** The pattern for any start: PATTERN_PERIOD + length bytes of it. */
function pattern(length: number): Uint8Array {
  if (patternMemory.length >= PATTERN_PERIOD + length) return patternMemory
  const bytes = new Uint8Array(PATTERN_PERIOD + length).fill(255)
  for (const p of PATTERN_PRIMES) {
    // p r lies below 30 p, so these eight progressions of bytes, with step p, hold every multiple of p coprime to 30.
    for (const r of RESIDUES) strike(bytes, Math.floor((p * r) / WHEEL), p, ~(1 << BIT_OF[(p * r) % WHEEL]))
  }
  patternMemory = bytes
  return bytes
}

function strike(bytes: Uint8Array, start: number, step: number, mask: number): number {
  const end = bytes.length
  let i = start
  for (; i < end; i += step) bytes[i] &= mask
  return i
}

/** The striking primes with, for each, eight byte positions relative to `fromByte` and the bit to clear there. */
interface Strikes {
  primes: Int32Array
  next: Int32Array
  masks: Uint8Array
}

function firstStrikes(fromByte: number, byteCount: number, hi: number): Strikes {
  const primes = Int32Array.from(primesUpTo(floorSqrt(hi)).filter((p) => p > PATTERN_PRIMES[PATTERN_PRIMES.length - 1]))
  const next = new Int32Array(primes.length * 8)
  const masks = new Uint8Array(primes.length * 8)
  primes.forEach((p, k) => {
    // A composite p q with a cofactor q < p has a smaller prime factor, which strikes it. The quotient is one too small so
    // that its rounding does not matter; what then falls before the first byte moves on by 30 p, which is p bytes.
    const least = Math.max(p, Math.ceil((WHEEL * fromByte) / p) - 1)
    const base = least - (least % WHEEL)
    RESIDUES.forEach((r, j) => {
      const cofactor = base + r < least ? base + r + WHEEL : base + r
      const multiple = p * cofactor
      let byte = Math.floor(multiple / WHEEL) - fromByte
      if (byte < 0) byte += p
      // Beyond the range: any position there serves, and stays within 32 bits.
      next[k * 8 + j] = Math.min(byte, byteCount)
      masks[k * 8 + j] = ~(1 << BIT_OF[multiple % WHEEL])
    })
  })
  return { primes, next, masks }
}

/**
 * Visits, in order and in segments, the primes p with lo < p <= hi and p > 5. `bytes` is a sieve as wheel.ts describes, from
 * byte `firstByte` on; its length is a multiple of SEGMENT_ALIGNMENT, and it is only valid during the visit.
 *
 * *Claim*: bit j of bytes[i] is set exactly where 30 (firstByte + i) + RESIDUES[j] is a prime in (lo, hi] of the residue class
 * asked for. *Valid for*: integers 0 <= lo <= hi <= SIEVE_LIMIT, hi - lo <= 2^35. *Bound*: S-1.
 */
export function sievePrimes(lo: number, hi: number, visit: (bytes: Uint8Array, firstByte: number) => void, options: SieveOptions = {}): void {
  if (hi > SIEVE_LIMIT || hi - lo > 2 ** 35) throw new RangeError('range too large for the sieve')
  if (hi <= lo || hi < 7) return
  const root = floorSqrt(hi)
  const segmentBytes = options.segmentBytes ?? (root < 2 ** 18 ? 2 ** 16 : 2 ** 18)
  const start = alignDown(Math.floor(lo / WHEEL), SEGMENT_ALIGNMENT)
  const byteCount = alignDown(Math.floor(hi / WHEEL) - start, SEGMENT_ALIGNMENT) + SEGMENT_ALIGNMENT
  const { primes, next, masks } = firstStrikes(start, byteCount, hi)
  const prepared = pattern(segmentBytes)
  const classMask = options.residueClass && residueClassMask(options.residueClass)
  const buffer = new Uint8Array(Math.min(segmentBytes, byteCount))

  for (let done = 0; done < byteCount; done += segmentBytes) {
    const length = Math.min(segmentBytes, byteCount - done)
    const bytes = length === buffer.length ? buffer : buffer.subarray(0, length)
    const from = start + done
    const phase = from % PATTERN_PERIOD
    bytes.set(prepared.subarray(phase, phase + length))
    if (from === 0) bytes[0] = PATTERN_BYTE_ZERO
    const largest = floorSqrt(WHEEL * (from + length))
    for (let k = 0; k < primes.length && primes[k] <= largest; k++) {
      const p = primes[k]
      for (let j = k * 8; j < k * 8 + 8; j++) next[j] = strike(bytes, next[j] - done, p, masks[j]) + done
    }
    if (classMask) applyMask(bytes, from, classMask)
    clear(bytes, from, lo, hi)
    visit(bytes, from)
  }
}

/** Byte 0: 1 is no prime, and 7, 11, 13, 17, which the pattern strikes, are. */
const PATTERN_BYTE_ZERO = 0b11111110

function alignDown(n: number, step: number): number {
  return n - (n % step)
}

/** Clears what lies outside (lo, hi]. */
function clear(bytes: Uint8Array, from: number, lo: number, hi: number): void {
  const low = Math.floor(lo / WHEEL) - from
  if (low >= 0) {
    bytes.fill(0, 0, Math.min(low, bytes.length))
    if (low < bytes.length) clipByte(bytes, low, from + low, lo, hi)
  }
  const high = Math.floor(hi / WHEEL) - from
  if (high < bytes.length) {
    clipByte(bytes, high, from + high, lo, hi)
    bytes.fill(0, high + 1)
  }
}

/** One period, `modulus` bytes, of the bits n = residue (mod modulus). */
function residueClassMask({ modulus, residue }: { modulus: number; residue: number }): Uint8Array {
  return Uint8Array.from({ length: modulus }, (_, i) =>
    RESIDUES.reduce((byte: number, r, j) => ((WHEEL * i + r) % modulus === residue % modulus ? byte | (1 << j) : byte), 0),
  )
}

function applyMask(bytes: Uint8Array, from: number, mask: Uint8Array): void {
  let phase = from % mask.length
  for (let i = 0; i < bytes.length; i++) {
    bytes[i] &= mask[phase]
    if (++phase === mask.length) phase = 0
  }
}
