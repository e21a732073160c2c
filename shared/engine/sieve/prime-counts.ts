import { type SieveOptions, sievePrimes } from './prime-sieve.ts'
import { RESIDUES, WHEEL, WHEEL_PRIMES } from './wheel.ts'

function wheelPrimes(lo: number, hi: number, { residueClass }: SieveOptions): number[] {
  return WHEEL_PRIMES.filter(
    (p) => lo < p && p <= hi && (!residueClass || (p - residueClass.residue) % residueClass.modulus === 0),
  )
}

/** The number of set bits of a 32-bit word. */
function popcount(word: number): number {
  let n = word - ((word >>> 1) & 0x55555555)
  n = (n & 0x33333333) + ((n >>> 2) & 0x33333333)
  return Math.imul((n + (n >>> 4)) & 0x0f0f0f0f, 0x01010101) >>> 24
}

/** How many primes p have lo < p <= hi. *Bound*: S-1. */
export function countPrimes(lo: number, hi: number, options: SieveOptions = {}): number {
  let count = wheelPrimes(lo, hi, options).length
  sievePrimes(
    lo,
    hi,
    (bytes) => {
      const words = new Int32Array(bytes.buffer, bytes.byteOffset, bytes.length / 4)
      for (let i = 0; i < words.length; i++) count += popcount(words[i])
    },
    options,
  )
  return count
}

/** Calls `visit` with each prime p, lo < p <= hi, ascending. For sums over many primes use the moments instead. */
export function forEachPrime(lo: number, hi: number, visit: (p: number) => void, options: SieveOptions = {}): void {
  wheelPrimes(lo, hi, options).forEach(visit)
  sievePrimes(
    lo,
    hi,
    (bytes, firstByte) => {
      for (let i = 0; i < bytes.length; i++) {
        for (let bits = bytes[i]; bits !== 0; bits &= bits - 1) visit(WHEEL * (firstByte + i) + RESIDUES[31 - Math.clz32(bits & -bits)])
      }
    },
    options,
  )
}
