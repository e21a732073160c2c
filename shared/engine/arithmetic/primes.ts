/** Small primes by a plain sieve, and exact facts about small integers. For ranges beyond 10^7 use the segmented sieve. */

/** All primes <= limit, ascending. */
export function primesUpTo(limit: number): number[] {
  const composite = new Uint8Array(limit + 1)
  const primes: number[] = []
  for (let n = 2; n <= limit; n++) {
    if (composite[n]) continue
    primes.push(n)
    for (let multiple = n * n; multiple <= limit; multiple += n) composite[multiple] = 1
  }
  return primes
}

/** Whether n is prime, by trial division: for integers below 2^53 that a person types. */
export function isPrime(n: number): boolean {
  if (!Number.isSafeInteger(n) || n < 2) return false
  for (let d = 2; d * d <= n; d += d === 2 ? 1 : 2) if (n % d === 0) return false
  return true
}

/** The distinct primes that divide n >= 1, ascending, by trial division. */
export function primeDivisors(n: number): number[] {
  const divisors: number[] = []
  let rest = n
  for (let d = 2; d * d <= rest; d += d === 2 ? 1 : 2) {
    if (rest % d !== 0) continue
    divisors.push(d)
    while (rest % d === 0) rest /= d
  }
  return rest > 1 ? [...divisors, rest] : divisors
}

/** The Moebius function of n >= 1. */
export function moebius(n: number): -1 | 0 | 1 {
  const divisors = primeDivisors(n)
  if (divisors.reduce((product, p) => product * p, 1) !== n) return 0
  return divisors.length % 2 === 0 ? 1 : -1
}

/** least[n] = the least prime that divides n, for 2 <= n <= limit. */
export function leastPrimeDivisors(limit: number): Uint32Array {
  const least = new Uint32Array(limit + 1)
  for (const p of primesUpTo(limit)) {
    for (let multiple = p; multiple <= limit; multiple += p) if (least[multiple] === 0) least[multiple] = p
  }
  return least
}
