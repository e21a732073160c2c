import { combine as linear } from '../arithmetic/polynomial.ts'
import type { Definition, OverPrimesDefinition, SeriesDefinition, SetOfIntegers } from './definition.ts'
import { polynomialText, quotientText } from './polynomial-text.ts'
import { type Plain, weightText } from './weight-text.ts'

/** How a definition reads: LaTeX for print and screen, one line of plain text, and other usual names of the same number. */
export interface Reading {
  latex: string
  text: string
  aliases: string[]
}

/** Standard notation: Omega(n) counts prime factors with multiplicity, omega(n) distinct ones, mu is the Moebius function. */
export function readDefinition(definition: Definition): Reading {
  const { latex, text } = definition.type === 'series' ? series(definition) : definition.type === 'over-primes' ? overPrimes(definition) : mertens()
  return { latex, text, aliases: aliasesOf(definition) }
}

function series({ set, weight }: SeriesDefinition): Plain {
  const [name, latexConditions, textConditions] = conditions(set)
  const term = weightText(weight, name)
  const under = latexConditions.length > 1 ? `\\substack{${latexConditions.join(' \\\\ ')}}` : latexConditions[0]
  return { latex: `\\sum_{${under}} ${term.latex}`, text: `sum over ${textConditions} of ${term.text}` }
}

/** The letter for a member, the lines under the sum sign, and the words. */
function conditions(set: SetOfIntegers): [name: string, latex: string[], text: string] {
  if (set.kind === 'finite') {
    const shown = set.members.slice(0, 5).join(', ')
    const many = set.members.length > 5
    return ['n', [`n \\in \\{${shown}${many ? ', \\ldots' : ''}\\}`], `n in a list of ${set.members.length} integers (${shown}${many ? ', …' : ''})`]
  }
  const prime = set.kind === 'primes' || set.kind === 'residue-class'
  const name = prime ? 'p' : 'n'
  const [lines, words] = kindConditions(set)
  const without = set.exclude
  if (without.length === 0) return [name, lines, words]
  const list = without.join(', ')
  if (prime) {
    const outside = without.length === 1 ? `p \\ne ${list}` : `p \\notin \\{${list}\\}`
    return [name, [...lines, outside], `${words}, ${without.length === 1 ? `p != ${list}` : `p not in {${list}}`}`]
  }
  const outside = without.length <= 2 ? without.map((p) => `${p} \\nmid n`).join(',\\; ') : `\\gcd(n, ${product(without)}) = 1`
  return [name, [...lines, outside], `${words}, not divisible by ${list}`]
}

function product(primes: readonly number[]): string {
  return primes.map(String).join(' \\cdot ')
}

function kindConditions(set: Exclude<SetOfIntegers, { kind: 'finite' }>): [string[], string] {
  switch (set.kind) {
    case 'primes':
      return [['p'], 'primes p']
    case 'almost-primes':
      return [['n \\ge 2', `\\Omega(n) = ${set.k}`], `integers n with exactly ${set.k} prime factors (with multiplicity)`]
    case 'squarefree-almost-primes':
      return [['n \\ge 2', `\\mu^2(n) = 1,\\; \\omega(n) = ${set.k}`], `products n of ${set.k} distinct primes`]
    case 'distinct-prime-factors':
      return set.k === 1
        ? [['n \\ge 2', '\\omega(n) = 1'], 'prime powers n']
        : [['n \\ge 2', `\\omega(n) = ${set.k}`], `integers n with exactly ${set.k} distinct prime factors`]
    case 'integers':
      return [['n \\ge 2'], 'integers n >= 2']
    case 'squarefree':
      return [['n \\ge 2', '\\mu^2(n) = 1'], 'squarefree integers n >= 2']
    case 'smooth':
      return [['n \\ge 2', `P^+(n) \\le ${set.y}`], `integers n >= 2 without a prime factor above ${set.y}`]
    case 'residue-class':
      return [[`p \\equiv ${set.residue} \\pmod{${set.modulus}}`], `primes p = ${set.residue} mod ${set.modulus}`]
  }
}

function overPrimes({ numerator, denominator, combine, exclude }: OverPrimesDefinition): Plain {
  // A factor is shown as what it differs from 1 by.
  const bottom = denominator.map(BigInt)
  const top = combine === 'sum' ? numerator.map(BigInt) : linear(1n, numerator.map(BigInt), -1n, bottom)
  // A minus sign of the whole numerator goes in front.
  const negative = top.length > 0 && top[top.length - 1] < 0n
  const shown = negative ? top.map((c) => -c) : top
  const latex = `\\frac{${polynomialText(shown, true)}}{${polynomialText(bottom, true)}}`
  const text = quotientText(shown, bottom)
  const under = exclude.length === 0 ? 'p' : exclude.length === 1 ? `p \\ne ${exclude[0]}` : `p \\notin \\{${exclude.join(', ')}\\}`
  const words = exclude.length === 0 ? 'primes p' : `primes p other than ${exclude.join(', ')}`
  if (combine === 'sum') return { latex: `\\sum_{${under}} ${negative ? '-' : ''}${latex}`, text: `sum over ${words} of ${negative ? '-' : ''}${text}` }
  const sign = negative ? '-' : '+'
  return { latex: `\\prod_{${under}} \\left(1 ${sign} ${latex}\\right)`, text: `product over ${words} of 1 ${sign} ${text}` }
}

function mertens(): Plain {
  return {
    latex: '\\lim_{x \\to \\infty} \\Bigl(\\sum_{p \\le x} \\frac{1}{p} - \\log\\log x\\Bigr)',
    text: 'limit of (sum of 1/p over primes p <= x) - log log x',
  }
}

const NAMED_PRODUCTS: Record<string, string> = {
  '0,-2,1|1,-2,1|2': 'twin prime constant',
  '-1,-1,1|0,-1,1|': "Artin's constant",
}

function aliasesOf(definition: Definition): string[] {
  if (definition.type === 'named') return ['Mertens constant', 'Meissel-Mertens constant']
  if (definition.type === 'over-primes') {
    const key = [definition.numerator, definition.denominator, definition.exclude].join('|')
    return definition.combine === 'product' && NAMED_PRODUCTS[key] ? [NAMED_PRODUCTS[key]] : []
  }
  const { set } = definition
  const aliases: string[] = []
  if ('exclude' in set && set.exclude.join() === '2') aliases.push(set.kind === 'primes' ? 'odd primes' : `odd ${KIND_NAMES[set.kind] ?? ''}`.trim())
  if (set.kind === 'almost-primes' && set.k === 2) aliases.push('semiprimes')
  if (set.kind === 'distinct-prime-factors' && set.k === 1) aliases.push('prime powers')
  return aliases
}

const KIND_NAMES: Partial<Record<SetOfIntegers['kind'], string>> = {
  'almost-primes': 'almost primes',
  'squarefree-almost-primes': 'squarefree almost primes',
  integers: 'integers',
  squarefree: 'squarefree integers',
  smooth: 'smooth integers',
}
