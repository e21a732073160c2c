import { type Arithmetic, sum } from '../arithmetic/arithmetic.ts'
import { isPrime, moebius, primeDivisors } from '../arithmetic/primes.ts'
import { type Rational, ONE, rational } from '../arithmetic/rational.ts'
import { isReal, units } from './characters.ts'
import { type Complex, multiplyComplex } from './complex.ts'
import type { DirichletSeries, SeriesPoint } from './dirichlet.ts'
import { type LogL, createLogL } from './log-l.ts'
import { almostPrimeMajorant } from './majorants.ts'
import { type ZetaContext, powerOfTwo } from './zeta-context.ts'

/**
 * Primes p = residue mod modulus that are not excluded: with A the split and chi the characters of the modulus,
 *   sum over such p > A of p^-s = sum over m of mu(m)/m sum over b^m = a of (1/phi) sum over chi of conj chi(b) log L_A(ms, chi).
 * *Claim*: `evaluate` contains it. *Valid for*: modulus >= 3. *Bound*: L-5.
 */
export function residueClassSeries(modulus: number, residue: number, exclude: readonly number[], power: Rational): DirichletSeries {
  const inClass = (p: number): boolean => p % modulus === residue
  let least = 2
  while (!isPrime(least) || !inClass(least) || exclude.includes(least)) least += 1
  return {
    pole: 0,
    leastMember: BigInt(least),
    majorant: almostPrimeMajorant(power, 1),
    prepare: (context) => prepareLogL(context, modulus),
    evaluate(at) {
      const { arithmetic, primes } = at.point.context
      const powers = (list: readonly number[]) => sum(arithmetic, list.filter(inClass).map((p) => at.point.primePower(p, 1)))
      return arithmetic.subtract(arithmetic.add(powers(primes), overRoughPrimes(at, modulus, residue)), powers(exclude))
    },
  }
}

const known = new WeakMap<object, Map<number, LogL<unknown>>>()

/** The L-functions of one modulus in one context are made once, since their branch takes a proof. */
function prepareLogL<N>(context: ZetaContext<N>, modulus: number): void {
  const ofContext = known.get(context) ?? new Map<number, LogL<unknown>>()
  known.set(context, ofContext)
  if (!ofContext.has(modulus)) ofContext.set(modulus, createLogL(context.arithmetic, modulus, context.split))
}

function logLOf<N>(context: ZetaContext<N>, modulus: number): LogL<N> {
  const made = known.get(context)?.get(modulus)
  if (!made) throw new Error('the L-functions of this modulus are not prepared')
  return made as LogL<N>
}

function overRoughPrimes<N>(at: SeriesPoint<N>, modulus: number, residue: number): N {
  const { context, s, excess } = at.point
  const { arithmetic } = context
  const logL = logLOf(context, modulus)
  const classes = units(modulus)
  const logs = logL.at(s, excess)
  let total = arithmetic.rational(rational(0))
  for (let m = 1; m <= at.order; m++) {
    if (m > 1) logs.advance()
    const roots = classes.filter((b) => powerModulo(b, m, modulus) === residue)
    const mu = moebius(m)
    if (mu === 0 || roots.length === 0) continue
    const principal = arithmetic.scale(logPrincipal(at, modulus, m), rational(roots.length))
    const others = logs.logs().map((log, i) => againstCharacter(arithmetic, logL, i, roots, log))
    total = arithmetic.add(total, arithmetic.scale(arithmetic.add(principal, sum(arithmetic, others)), rational(mu, m * classes.length)))
  }
  return arithmetic.addError(total, powerOfTwo(arithmetic, at.roughBits(at.order + 1)))
}

/** log L_A(ms, chi) for the principal character: log zeta_A(ms) without the primes above A that divide the modulus. */
function logPrincipal<N>(at: SeriesPoint<N>, modulus: number, m: number): N {
  const { arithmetic, one, split } = at.point.context
  const divisors = primeDivisors(modulus).filter((p) => p > split)
  return divisors.reduce(
    (total, p) => arithmetic.add(total, arithmetic.log(arithmetic.subtract(one, at.point.primePower(p, m)))),
    at.logRough(m),
  )
}

/** sum over b of conj chi(b) times log, with what the conjugate character brings: a real number. */
function againstCharacter<N>(a: Arithmetic<N>, logL: LogL<N>, index: number, classes: readonly number[], log: Complex<N>): N {
  const chi = logL.characters[index]
  const conjugates = classes.map((b) => logL.roots[(chi.order - chi.exponents[b]) % chi.order])
  const weight = { re: sum(a, conjugates.map((z) => z.re)), im: sum(a, conjugates.map((z) => z.im)) }
  return a.scale(multiplyComplex(a, weight, log).re, isReal(chi) ? ONE : rational(2))
}

function powerModulo(base: number, exponent: number, modulus: number): number {
  let value = 1
  for (let i = 0; i < exponent; i++) value = (value * base) % modulus
  return value
}
