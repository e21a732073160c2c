import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { createBallArithmetic } from '../arithmetic/ball.ts'
import { ONE, type Rational, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Estimate } from '../estimates/estimate.ts'
import { envelopeBeyond } from '../estimates/envelope.ts'
import { estimateById } from '../estimates/library.ts'
import { classTail, primeTail } from '../estimates/prime-tail.ts'
import type { Definition } from '../sets/definition.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import { approximate, unconditional } from './partial-sum-parameters.ts'
import type { Plan } from './partial-sum-plan.ts'

const PRECISION = 64
/** Products are made of sums of p^-s from s = 1 on, whose tails lie about as this weight's does. heuristic: affects choice only */
const NEAR_ONE: RationalWeight = { power: ONE, logPower: ONE }

function refuseTail(): never {
  throw new EngineRefusal('no_estimate', 'without', 'Without the estimates in doubt none is left that bounds what lies beyond the cut-off. Choose another cut-off or another method.')
}

/**
 * The plan with some estimates left out: what is allowed for the tail, and a radius that has grown by as much as the others bound it
 * worse. Sets whose tail needs no estimate keep their plan. Refuses an id that the library does not know.
 */
export function planWithout(plan: Plan, definition: Definition, without: readonly string[]): Plan {
  for (const id of without) {
    if (!estimateById(id)) throw new EngineRefusal('unknown_estimate', 'without', `There is no estimate named ${id.slice(0, 80)}.`)
  }
  const all = unconditional()
  const left = all.filter(({ id }) => !without.includes(id))
  if (left.length === all.length || definition.type !== 'series' || plan.byFactors || definition.set.kind === 'smooth') return plan
  const { set } = definition
  const modulus = set.kind === 'residue-class' ? set.modulus : 1
  const weight = set.kind === 'primes' || set.kind === 'residue-class' ? plan.weight : NEAR_ONE
  const arithmetic = createBallArithmetic(PRECISION)
  return {
    ...plan,
    estimates: left,
    modulus,
    radiusAt(cutoff) {
      const rest = tailWidth(arithmetic, weight, cutoff, modulus, left)
      const best = rest && tailWidth(arithmetic, weight, cutoff, modulus, all)
      if (!rest || !best || best.num === 0n) return Infinity
      return plan.radiusAt(cutoff) * approximate({ num: rest.num * best.den, den: rest.den * best.num })
    },
  }
}

/** The width that the tail leaves by these estimates, as if theta were known at the cut-off; null where they do not bound it. */
function tailWidth<N>(arithmetic: Arithmetic<N>, weight: RationalWeight, cutoff: number, modulus: number, estimates: readonly Estimate[]): Rational | null {
  if (!envelopeBeyond(arithmetic, cutoff, estimates, weight, modulus)) return null
  const theta = { lo: rational(cutoff), hi: rational(cutoff) }
  const tail = modulus > 1 ? classTail(arithmetic, weight, cutoff, theta, modulus, estimates) : primeTail(arithmetic, weight, cutoff, theta, estimates)
  return tail.uncertainty
}

/** The estimates that a plan allows, where they bound what lies beyond this cut-off; refuses where they do not. */
export function estimatesLeft({ estimates = [], weight, modulus = 1 }: Plan, cutoff: number): readonly Estimate[] {
  return envelopeBeyond(createBallArithmetic(PRECISION), cutoff, estimates, weight, modulus) ? estimates : refuseTail()
}
