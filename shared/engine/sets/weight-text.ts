import { ONE, type Rational, compare, magnitude, parseRational } from '../arithmetic/rational.ts'
import type { Weight } from './definition.ts'

/** A formula in LaTeX and in plain text. */
export interface Plain {
  latex: string
  text: string
}

/** The weight of a member called `name`: 1/(n log n), log^2 n/n^(3/2). */
export function weightText(weight: Weight, name: string): Plain {
  const [s0, b] = [exact(weight.power), exact(weight.logPower)]
  const latexLog = logarithm(magnitude(b), name, true)
  const textLog = logarithm(magnitude(b), name, false)
  const latexPower = raised(name, s0, true)
  const textPower = raised(name, s0, false)
  if (b.num === 0n) return { latex: `\\frac{1}{${latexPower}}`, text: `1/${textPower}` }
  if (b.num < 0n) return { latex: `\\frac{${latexLog}}{${latexPower}}`, text: `${textLog}/${textPower}` }
  return { latex: `\\frac{1}{${latexPower} ${latexLog}}`, text: `1/(${textPower} ${textLog})` }
}

function exact(text: string): Rational {
  const value = parseRational(text)
  if (!value) throw new RangeError(`not an exact number: ${text}`)
  return value
}

function isOne(a: Rational): boolean {
  return compare(a, ONE) === 0
}

function exponentText(a: Rational, latex: boolean): string {
  const plain = a.den === 1n ? a.num.toString() : `${a.num}/${a.den}`
  return latex ? `{${plain}}` : a.den === 1n ? plain : `(${plain})`
}

function raised(name: string, a: Rational, latex: boolean): string {
  return isOne(a) ? name : `${name}^${exponentText(a, latex)}`
}

function logarithm(b: Rational, name: string, latex: boolean): string {
  const log = latex ? '\\log' : 'log'
  return isOne(b) ? `${log} ${name}` : `${log}^${exponentText(b, latex)} ${name}`
}
