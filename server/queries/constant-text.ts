import { primeDivisors } from '../../shared/engine/arithmetic/primes.ts'
import { parseRational, toText } from '../../shared/engine/arithmetic/rational.ts'

/** What a line typed into the register's search field says. Every part narrows the list; what is not understood are `words`. */
export interface TextQuery {
  number?: number
  power?: string
  logPower?: string
  /** The sum runs over a letter p: over primes. */
  overPrimes?: true
  k?: number
  /** Leaves out the prime 2, perhaps others too. */
  odd?: true
  /** Excludes exactly these primes. */
  exclude?: number[]
  /** Digits as typed, to be found at the beginning of the constant. */
  digits?: string
  words: string[]
}

/** Lower case, without accents: as both the words of a constant and what is typed are compared. */
export function fold(text: string): string {
  return text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase()
}

/** Words that say nothing of which constant is meant. */
const IDLE = new Set(['a', 'all', 'and', 'constant', 'for', 'from', 'in', 'integers', 'of', 'on', 'over', 'sum', 'the', 'to', 'with'])

const NUMBER = String.raw`\(?(\d{1,9}(?:[./]\d{1,9})?)\)?`
const LOG = String.raw`\(?\s*(?:log|ln)\s*(?:\^\s*${NUMBER})?\s*\(?\s*\1\s*\)?\s*\)?\s*(?:\^\s*${NUMBER})?`
/** 1/n, 1/n^2, 1/(p log p), 1/(n log^2 n), 1/(n (log n)^1/2) */
const FRACTION = new RegExp(String.raw`1\s*/\s*\(?\s*\b([a-z])\b\s*(?:\^\s*${NUMBER})?\s*[*·]?\s*(?:${LOG})?\s*\)*`)
/** n^-2, n^-1 (log n)^-1 */
const POWERS = new RegExp(String.raw`\b([a-z])\s*\^\s*\(?\s*-\s*${NUMBER}\s*\)?\s*[*·]?\s*(?:\(\s*(?:log|ln)\s*\(?\s*\1\s*\)?\s*\)\s*\^\s*\(?\s*-\s*${NUMBER}\s*\)?)?`)

function rationalText(text: string): string {
  const value = parseRational(text)
  return value === null ? text : toText(value)
}

/** Reads a line such as "odd, k = 3", "1/(p log p)", "1.6366", "MST-0042" or plain words. */
export function readTextQuery(text: string): TextQuery {
  const query: TextQuery = { words: [] }
  let rest = fold(text)
    .replace(/\\[dt]?frac\s*\{([^{}]*)\}\s*\{([^{}]*)\}/g, '$1/($2)')
    .replace(/[{}\\$]/g, '')
    .replace(/−/g, '-')
  /** Takes the first match out of what is left to read. */
  const take = (pattern: RegExp): RegExpExecArray | null => {
    const match = pattern.exec(rest)
    if (match) rest = `${rest.slice(0, match.index)} ${rest.slice(match.index + match[0].length)}`
    return match
  }

  const number = take(/\bmst[-\s]?(\d{1,9})(?:[/-]\d+)?\b/)
  if (number) query.number = Number(number[1])

  const weight = take(FRACTION) ?? take(POWERS)
  if (weight) {
    const [all, letter, power = '1', inner, outer] = weight
    query.power = rationalText(power)
    query.logPower = rationalText(inner ?? outer ?? (/log|ln/.test(all) ? '1' : '0'))
    if (letter === 'p') query.overPrimes = true
  }
  if (take(/\berdos\b/)) {
    query.power ??= '1'
    query.logPower ??= '1'
  }

  const k = take(/\bk\s*=\s*(\d{1,9})\b/) ?? take(/\b(\d{1,9})[\s-]*almost\b/)
  if (k) query.k = Number(k[1])
  else if (take(/\bsemi-?primes?\b/)) query.k = 2

  const coprime = take(/\bcoprime\s+to\s+(\d{1,9})\b/)
  const excluded = coprime ? null : take(/\b(?:exclud(?:e|ing|ed)|without)\s+(\d{1,7}(?:\s*(?:,|and|\s)\s*\d{1,7}\b(?!\.))*)/)
  if (coprime) query.exclude = primeDivisors(Number(coprime[1]))
  else if (excluded) query.exclude = [...new Set(excluded[1].match(/\d+/g)?.map(Number))].sort((a, b) => a - b)
  else if (take(/\bodd\b/)) query.odd = true

  const digits = take(/(-?\d+\.\d+(?: \d{2,})*)(?:…|\.\.\.)?/)
  if (digits) query.digits = digits[1].replaceAll(' ', '')

  const words = rest.match(/[\p{L}\p{N}]+/gu) ?? []
  const telling = words.filter((word) => !IDLE.has(word))
  query.words = (telling.length > 0 || Object.keys(query).length > 1 ? telling : words).slice(0, 12)
  return query
}
