import { primesUpTo } from '../arithmetic/primes.ts'

/** Largest integer that `factorSmall` takes: the remainder in `timesModulo` must stay within 32 bits. */
export const SMALL_LIMIT = 2 ** 30

/** Up to the cube root of SMALL_LIMIT. */
const TRIAL_PRIMES = Int32Array.from(primesUpTo(1024))

/** a b mod n, 0 <= a, b < n <= SMALL_LIMIT. The quotient by doubles may be wrong by one either way, which is then mended. */
function timesModulo(a: number, b: number, n: number): number {
  const quotient = Math.floor((a * b) / n)
  // Exact modulo 2^32, and the true value lies in (-n, 2n), which 32 bits tell apart.
  const rest = (Math.imul(a, b) - Math.imul(quotient, n)) | 0
  return rest < 0 ? rest + n : rest >= n ? rest - n : rest
}

function powerModulo(base: number, exponent: number, n: number): number {
  let [result, square] = [1, base % n]
  for (let e = exponent; e > 0; e >>>= 1) {
    if (e & 1) result = timesModulo(result, square, n)
    square = timesModulo(square, square, n)
  }
  return result
}

/**
 * Whether an odd n, 1024 < n < 2^30, is prime: strong pseudoprimes to the bases 2, 3, 5 and 7 begin at 3215031751
 * (C. Pomerance, J. L. Selfridge, S. S. Wagstaff, Math. Comp. 35 (1980) 1003-1026).
 */
function isPrimeSmall(n: number): boolean {
  const twos = 31 - Math.clz32((n - 1) & -(n - 1))
  return [2, 3, 5, 7].every((base) => {
    let x = powerModulo(base, (n - 1) >>> twos, n)
    if (x === 1) return true
    for (let i = 0; i < twos; i++) {
      if (x === n - 1) return true
      x = timesModulo(x, x, n)
    }
    return false
  })
}

/** A proper divisor of a composite odd n by Pollard's rho; tries another polynomial where one fails. */
function properDivisor(n: number): number {
  for (let c = 1; ; c++) {
    let [slow, fast, divisor] = [2, 2, 1]
    while (divisor === 1) {
      // Sixteen steps share one greatest common divisor; where it swallows both primes at once, step by step from here.
      let product = 1
      const [slowBefore, fastBefore] = [slow, fast]
      for (let i = 0; i < 16; i++) {
        slow = step(slow, c, n)
        fast = step(step(fast, c, n), c, n)
        product = timesModulo(product, Math.abs(slow - fast), n)
      }
      divisor = gcd(product, n)
      if (divisor !== n) continue
      ;[slow, fast, divisor] = [slowBefore, fastBefore, 1]
      while (divisor === 1) {
        slow = step(slow, c, n)
        fast = step(step(fast, c, n), c, n)
        divisor = gcd(Math.abs(slow - fast), n)
      }
    }
    if (divisor < n) return divisor
  }
}

function step(x: number, c: number, n: number): number {
  const next = timesModulo(x, x, n) + c
  return next >= n ? next - n : next
}

function gcd(a: number, b: number): number {
  while (b !== 0) [a, b] = [b, a % b]
  return a
}

/** The prime factors of 2 <= n < SMALL_LIMIT, ascending, each as often as it divides n. */
export function factorSmall(n: number): number[] {
  const factors: number[] = []
  let rest = n | 0
  for (let i = 0; i < TRIAL_PRIMES.length; i++) {
    const p = TRIAL_PRIMES[i]
    if (p * p > rest) break
    while (rest % p === 0) {
      factors.push(p)
      rest = (rest / p) | 0
    }
  }
  if (rest === 1) return factors
  // What is left has at most two prime factors, both above 1021.
  if (rest < 1024 * 1024 || isPrimeSmall(rest)) return [...factors, rest]
  const one = properDivisor(rest)
  return [...factors, ...[one, rest / one].sort((a, b) => a - b)]
}

/** Every divisor of the product of these primes, 1 and itself included, in no order. */
export function divisorsOf(factors: readonly number[]): number[] {
  const divisors = [1]
  let [block, previous] = [1, 0]
  for (const p of factors) {
    // A prime that comes again multiplies only what it made the time before.
    const from = p === previous ? divisors.length - block : 0
    const end = divisors.length
    block = end - from
    for (let i = from; i < end; i++) divisors.push(divisors[i] * p)
    previous = p
  }
  return divisors
}
