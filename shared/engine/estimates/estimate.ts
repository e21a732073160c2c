/**
 * A published explicit inequality, for people (statement, source, what was checked) and for the machine (claim). Whether it
 * is in force or in doubt is for the users to say and lives in the database.
 */
export interface Estimate {
  /** Stable; certificates cite it. */
  id: string
  title: string
  statement: string
  statementLatex: string
  validFor: string
  conditional: boolean
  /** What it is conditional on. */
  condition: string | null
  /** Where it is published, with the number of the theorem. */
  source: string
  /** What was checked here, and how far; and whether the source's own text was seen. */
  checked: string
  claim: Claim
}

/**
 * theta, psi: Chebyshev's functions less x. pi: the number of primes. pi-li: that less li(x). reciprocals: the sum of 1/p over
 * p <= x, less log log x + B. log-ratios: the sum of log(p)/p, less log x + E. theta-class: the sum of log p over the primes p <= x
 * of one class prime to a modulus q, less x/phi(q), for each such class.
 */
export type Quantity = 'theta' | 'theta-class' | 'psi' | 'pi' | 'pi-li' | 'reciprocals' | 'log-ratios'

/** lower(x) <= quantity(x) <= upper(x) for all x in the range; either may be missing. */
export interface Claim {
  quantity: Quantity
  /** Of theta-class: the least and the greatest modulus. */
  moduli?: readonly [number, number]
  from: Point
  /** null: for all larger x. */
  to: Point | null
  lower?: Bound
  upper?: Bound
}

/** An end of a range, exactly: x itself, or its logarithm. */
export type Point = { x: string } | { log: string }

export type Bound =
  /** A sum of terms. */
  | { form: 'sum'; terms: Term[] }
  /** x divided by a sum of terms. */
  | { form: 'quotient'; terms: Term[] }
  /** coefficient x (log x / base)^logPower exp(-rate sqrt(log x / r)), the decay that a zero-free region gives. */
  | { form: 'decay'; coefficient: string; logPower: string; base: string; rate: string; r: string }

/** coefficient x^power (log x)^logPower, divided by pi where it says so; exact decimals or fractions. */
export interface Term {
  coefficient: string
  power: string
  logPower: string
  overPi?: true
}

export const term = (coefficient: string, power: string, logPower: string): Term => ({ coefficient, power, logPower })

export const sum = (...terms: Term[]): Bound => ({ form: 'sum', terms })

/** The same bound with the sign turned: for |quantity| <= bound. */
export function negated(bound: Bound): Bound {
  if (bound.form === 'quotient') return { ...bound, terms: bound.terms.map(turned) }
  if (bound.form === 'decay') return { ...bound, coefficient: turnedText(bound.coefficient) }
  return { ...bound, terms: bound.terms.map(turned) }
}

/** |quantity| <= bound. */
export const twoSided = (bound: Bound): { lower: Bound; upper: Bound } => ({ lower: negated(bound), upper: bound })

/** How a statement came here, in the words shown to a reader. */
export const TRANSCRIBED = "statement taken from a formal transcription of the paper; the paper's own text not seen"
export const RECALLED = 'source text not seen'
export const checkedTo8 = (origin: string): string => `Numerically true on both sides of every jump up to 10^8 within its range; ${origin}.`
export const outOfReach = (origin: string): string => `Begins beyond the reach of the numerical check; ${origin}.`

/** An entry that rests on no hypothesis; the rest of an `Estimate` in short. */
export function unconditional(
  id: string,
  title: string,
  [statement, statementLatex]: readonly [string, string],
  validFor: string,
  source: string,
  checked: string,
  claim: Claim,
): Estimate {
  return { id, title, statement, statementLatex, validFor, conditional: false, condition: null, source, checked, claim }
}

export function underRiemannHypothesis(...parts: Parameters<typeof unconditional>): Estimate {
  return { ...unconditional(...parts), conditional: true, condition: 'the Riemann hypothesis' }
}

function turned(t: Term): Term {
  return { ...t, coefficient: turnedText(t.coefficient) }
}

function turnedText(coefficient: string): string {
  return coefficient.startsWith('-') ? coefficient.slice(1) : `-${coefficient}`
}
