/** Exact helpers on BigInt. Every rounding has its direction in the name; nothing here ever touches a float. */

export function abs(n: bigint): bigint {
  return n < 0n ? -n : n
}

export function max(a: bigint, b: bigint): bigint {
  return a > b ? a : b
}

export function min(a: bigint, b: bigint): bigint {
  return a < b ? a : b
}

/** Number of bits of |n|: the least L with |n| < 2^L; 0 for 0. */
export function bitLength(n: bigint): number {
  const hex = abs(n).toString(16)
  if (hex === '0') return 0
  return 4 * hex.length - HEX_LEADING_ZEROS[hex.charCodeAt(0) < 58 ? hex.charCodeAt(0) - 48 : hex.charCodeAt(0) - 87]
}

/** Leading zero bits of each hexadecimal digit read as four bits. */
const HEX_LEADING_ZEROS = [4, 3, 2, 2, 1, 1, 1, 1, 0, 0, 0, 0, 0, 0, 0, 0]

/** floor(n / 2^bits); a negative `bits` multiplies. */
export function floorShift(n: bigint, bits: number): bigint {
  return bits >= 0 ? n >> BigInt(bits) : n << BigInt(-bits)
}

/** ceil(n / 2^bits); a negative `bits` multiplies. */
export function ceilShift(n: bigint, bits: number): bigint {
  return -floorShift(-n, bits)
}

/** n / 2^bits to a nearest integer: the error is at most 1/2. */
export function nearestShift(n: bigint, bits: number): bigint {
  return bits > 0 ? (n + (1n << BigInt(bits - 1))) >> BigInt(bits) : n << BigInt(-bits)
}

/** floor(a / b), b > 0. */
export function floorDivide(a: bigint, b: bigint): bigint {
  const q = a / b
  return a < 0n && q * b !== a ? q - 1n : q
}

/** ceil(a / b), b > 0. */
export function ceilDivide(a: bigint, b: bigint): bigint {
  return -floorDivide(-a, b)
}

/** floor(sqrt(n)), n >= 0, by Newton's iteration from above, which decreases until it is there. */
export function isqrt(n: bigint): bigint {
  if (n < 0n) throw new RangeError('square root of a negative integer')
  if (n < 2n) return n
  let x = 1n << BigInt((bitLength(n) + 1) >> 1)
  for (;;) {
    const next = (x + n / x) >> 1n
    if (next >= x) return x
    x = next
  }
}

export function gcd(a: bigint, b: bigint): bigint {
  let [x, y] = [abs(a), abs(b)]
  while (y !== 0n) [x, y] = [y, x % y]
  return x
}

export function factorial(n: number): bigint {
  let product = 1n
  for (let i = 2; i <= n; i++) product *= BigInt(i)
  return product
}

export function binomial(n: number, k: number): bigint {
  if (k < 0 || k > n) return 0n
  let value = 1n
  for (let i = 1; i <= k; i++) value = (value * BigInt(n - k + i)) / BigInt(i)
  return value
}
