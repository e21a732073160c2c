import { primesUpTo } from '../arithmetic/primes.ts'
import type { Definition, SetOfIntegers } from '../sets/definition.ts'
import type { ArithmeticName } from './computation.ts'
import type { TrapezoidParameters } from './trapezoid-parameters.ts'

/**
 * What a sweep costs, counted in operations and timed on the reference machine. Nothing but forecasts, progress and the choice of a
 * method rests on it. heuristic: affects speed only
 */
interface Price {
  /** Start-up, seconds. */
  start: number
  /** Microseconds of an inner-loop product, of an exponential or logarithm, and of one operation on a number, by words of 64 bits. */
  product: (words: number) => number
  elementary: (words: number) => number
  operation: number
}

const PRICES: Record<ArithmeticName, Price> = {
  ball: {
    start: 0.05,
    product: (words) => 0.035 + 0.0055 * words + 0.001 * words * words,
    elementary: (words) => 0.3 + 0.55 * words + 0.035 * words * words,
    operation: 0.7,
  },
  mpfr: {
    start: 0.25,
    product: (words) => 0.22 + 0.03 * words,
    elementary: (words) => 3 + 2.5 * words,
    operation: 1.5,
  },
}

/** CPU seconds of a sweep for one definition. */
export function predictSeconds(definition: Definition, p: TrapezoidParameters, arithmetic: ArithmeticName): number {
  if (definition.type !== 'series') return 0
  const price = PRICES[arithmetic]
  const words = p.precision / 64
  const primes = primesUpTo(p.split).length
  const members = Math.max(p.terms, p.split * 0.75)
  const [numerator, denominator = '1'] = definition.weight.power.split('/')
  const order = ((p.precision + 9) / bitsOf(p.split + 1)) * (Number(denominator) / Number(numerator))
  const multiple = 2 * members * price.product(words) + primes * price.product(words) + price.elementary(words) + 8 * price.operation
  const setUp = primes * (price.elementary(words) + price.operation) + (members - primes) * 0.6 * price.operation + 3 * price.elementary(words)
  // A finite Euler product needs the powers of its own primes only.
  const shared = definition.set.kind === 'smooth' ? 10 * price.operation : setUp + multiple
  const microseconds = shared + ownCost(definition.set, { price, words, primes, order, multiple })
  return price.start + (p.last - p.first + 1) * microseconds * 1e-6
}

function bitsOf(n: number): number {
  return n.toString(2).length - 0.5
}

interface Shape {
  price: Price
  words: number
  primes: number
  order: number
  multiple: number
}

/** What a set needs at a node beyond the powers and the first zeta value. */
function ownCost(set: SetOfIntegers, { price, words, primes, order, multiple }: Shape): number {
  const k = 'k' in set ? set.k : 1
  const primeZeta = order * multiple + order * (1 + k / 4) * price.operation
  const symmetric = 0.45 * k * k * price.operation
  switch (set.kind) {
    case 'integers':
    case 'squarefree':
      return multiple
    case 'smooth':
      return primesUpTo(set.y).length * (price.elementary(words) + 2 * price.operation)
    case 'distinct-prime-factors':
      return primeZeta + symmetric + k * (order + primes) * price.operation
    case 'residue-class':
      return primeZeta + classCost(set.modulus, { price, words, primes, order })
    default:
      return primeZeta + symmetric
  }
}

/** Sums over the classes by Euler-Maclaurin and the logarithms of the L-functions, for each multiple of s. */
function classCost(modulus: number, { price, words, primes, order }: Omit<Shape, 'multiple'>): number {
  let classes = 0
  for (let a = 1; a <= modulus; a++) if (coprime(a, modulus)) classes++
  return order * classes * (98 * price.product(words) * words + (8 + 1.8 * primes) * price.operation)
}

/** Microseconds that a residue class adds to a node at s, for a sweep by any rule. */
export function classCostAt(modulus: number, s: number, p: { precision: number; split: number }, arithmetic: ArithmeticName): number {
  const order = (p.precision + 9) / bitsOf(p.split + 1) / s
  return classCost(modulus, { price: PRICES[arithmetic], words: p.precision / 64, primes: primesUpTo(p.split).length, order })
}

function coprime(a: number, b: number): boolean {
  return b === 0 ? a === 1 : coprime(b, a % b)
}
