/**
 * Reading the digits of a number as people paste them: from a manuscript, a LaTeX source, a table, a program's output. What can be
 * read in more than one way is refused with the reason; nothing is guessed.
 */

/** A decimal number as it was written, exactly: ±integer.fraction, all digits kept, no leading zero but "0" itself. */
export interface ReadNumber {
  negative: boolean
  integer: string
  fraction: string
  /** Written with dots after the last digit. */
  continues: boolean
  /** Uncertainty as written in brackets or after ±, in units of the last place; null: none. */
  uncertainty: string | null
}

export type Reading = { ok: true; number: ReadNumber } | { ok: false; reason: string }

/** More digits than this are refused. */
export const MOST_DIGITS = 10_000

class Unreadable extends Error {}
const refuse = (reason: string): never => {
  throw new Unreadable(reason)
}

/** Reads pasted digits as one decimal number, or says why it cannot be read as one. */
export function readDigits(text: string): Reading {
  try {
    return { ok: true, number: read(text) }
  } catch (error) {
    if (error instanceof Unreadable) return { ok: false, reason: error.message }
    throw error
  }
}

/** The number as plain decimal text. */
export function plainDecimal({ negative, integer, fraction }: ReadNumber): string {
  return `${negative ? '-' : ''}${integer}${fraction === '' ? '' : `.${fraction}`}`
}

function read(text: string): ReadNumber {
  const plain = rightHandSide(unifyMarks(text)).trim()
  if (!/\d/.test(plain)) refuse('There are no digits in this text.')
  if (/^[[(].*[;,].*[\])]$/s.test(plain)) refuse('This looks like an interval. Paste the digits of one number.')
  const { number, exponent } = takeExponent(plain)
  const { body, uncertainty } = takeUncertainty(number)
  const { digits, continues } = takeDots(body)
  if (continues && uncertainty !== null) refuse('Dots and an uncertainty exclude each other.')
  const { negative, magnitude } = takeSign(digits)
  const unknown = /[^\d.,'\s]/u.exec(magnitude)
  if (unknown) refuse(`The character “${unknown[0]}” is not part of a decimal number.`)
  const { integer, fraction } = splitAtPoint(magnitude, continues)
  if (integer.length + fraction.length > MOST_DIGITS) refuse(`That is more than ${MOST_DIGITS.toLocaleString('en')} digits.`)
  const moved = movePoint(integer, fraction, exponent)
  return { negative, integer: moved.integer.replace(/^0+(?=\d)/, '') || '0', fraction: moved.fraction, continues, uncertainty }
}

const SPACES = /\\(?:thinspace|medspace|thickspace|enspace|quad|qquad|hspace\{[^{}]{0,20}\}|hfill|allowbreak|displaystyle|textstyle)(?![a-z])|\\[,;:!> ]|[~&\t\u00a0\u2000-\u200b\u202f\u205f\u2060\ufeff]/g
const LINE_ENDS = /\\\\(?:\[[^[\]]{0,20}\])?|\\(?:linebreak|newline)(?![a-z])|\r\n?|\u2028|\u2029/g
const DOTS = /\\(?:ldots|dots|dotsc|cdots|hdots|textellipsis)(?![a-z])(?:\{\})?|⋯/g

/**
 * Writes every way of spelling a space, a sign, a point or dots in one way, and each run of spaces or dots as one, so that no
 * later pattern meets a long run. Line ends stay, since groups may break there.
 */
function unifyMarks(text: string): string {
  const marks = text
    .replace(LINE_ENDS, '\n')
    .replace(SPACES, ' ')
    .replace(/ {2,}/g, ' ')
    .replace(/ ?\n[ \n]*/g, '\n')
    .replace(/\{ ?([.,]) ?\}/g, '$1')
    .replace(DOTS, '…')
    .replace(/(?:…\s?[.…\s]*|(?:\.\s?){2,})/g, '…')
    .replace(/\\(?:approx|simeq|doteq|thickapprox)(?![a-z])|[≈≃≐≅]/g, '=')
    .replace(/\\pm(?![a-z])|\+\/-/g, '±')
    .replace(/\\(?:times|cdot)(?![a-z])|[×⋅]/g, '×')
    .replace(/\\num ?\{([^{}]*)\}/g, '$1')
    .replace(/\\[()[\]]|\\(?:left|right)(?![a-z])|\$/g, ' ')
    .replace(/[−–]/g, '-')
    .replace(/[’‘]/g, "'")
    .replace(/·/g, '.')
  const command = /\\[a-zA-Z]+/.exec(rightHandSide(marks))
  if (command) refuse(`The LaTeX command ${command[0]} is not part of a decimal number.`)
  return marks
}

/** What stands after the last "=" or "≈"; what stands before it must be a name and no second number. */
function rightHandSide(text: string): string {
  const at = text.lastIndexOf('=')
  if (at < 0) return text
  const left = text.slice(0, at).trim()
  if (/\d[.,]\d/.test(left) && !/\p{L}/u.test(left)) refuse('There is a number on both sides of “=”. Paste one of them.')
  return text.slice(at + 1)
}

/** Splits off "e-3", "E-3" or "× 10^{-3}". */
function takeExponent(text: string): { number: string; exponent: number } {
  const match = /\s*(?:[eE]\s*([+-]?\d{1,5})|×\s*10\s*\^\s*(?:\{\s*([+-]?\s*\d{1,5})\s*\}|([+-]?\d{1,5})))\s*\.?$/.exec(text)
  if (!match) return { number: text.replace(/[{}]/g, ' '), exponent: 0 }
  const exponent = Number((match[1] ?? match[2] ?? match[3] ?? '0').replace(/\s/g, ''))
  if (exponent < -MOST_DIGITS || exponent > MOST_DIGITS) refuse('The exponent is too large.')
  return { number: text.slice(0, match.index).replace(/[{}]/g, ' '), exponent }
}

/** Splits off an uncertainty: "(12)" in units of the last place, or "± 0.0012" to the places of the number. */
function takeUncertainty(text: string): { body: string; uncertainty: string | null } {
  const brackets = /\(\s*(\d[\d\s]*)\)\s*[.,;]?\s*$/.exec(text)
  if (brackets?.[1] !== undefined) return { body: text.slice(0, brackets.index), uncertainty: units(brackets[1].replace(/\s/g, '')) }
  const [body = '', margin, ...more] = text.split('±')
  if (margin === undefined) return { body: text, uncertainty: null }
  if (more.length > 0) refuse('There is more than one “±”.')
  const value = splitAtPoint(margin.replace(/[.;,]\s*$/, '').trim())
  const places = splitAtPoint(takeSign(takeDots(body).digits).magnitude).fraction.length
  if (value.fraction.length > places) refuse('The uncertainty has more places than the number.')
  return { body, uncertainty: units(value.integer + value.fraction.padEnd(places, '0')) }
}

const units = (digits: string): string => digits.replace(/^0+(?=\d)/, '')

/** Splits off dots that say that the number goes on, or a full stop or comma that ends a sentence. */
function takeDots(text: string): { digits: string; continues: boolean } {
  const [digits = '', ...after] = text.split('…')
  if (after.some((rest) => /[^\s.,;]/.test(rest))) refuse('Something follows the dots. Paste the digits of one number.')
  return after.length > 0 ? { digits: digits.trim(), continues: true } : { digits: digits.trim().replace(/[.,;]$/, ''), continues: false }
}

function takeSign(text: string): { negative: boolean; magnitude: string } {
  const match = /^\s*([+-]?)\s*(.*)$/s.exec(text)
  return { negative: match?.[1] === '-', magnitude: (match?.[2] ?? '').trim() }
}

/** Finds the decimal mark and takes the separators of groups out of both sides. */
function splitAtPoint(text: string, continues = false): { integer: string; fraction: string } {
  const points = text.split('.').length - 1
  const commas = text.split(',').length - 1
  const mark = decimalMark(text, points, commas, continues)
  if (mark === null) return { integer: joinThousands(text), fraction: '' }
  const at = mark === '.' && points === 1 ? text.indexOf('.') : text.lastIndexOf(mark)
  return { integer: joinThousands(text.slice(0, at)), fraction: joinGroups(text.slice(at + 1)) }
}

/** Which mark is the decimal one; null: the number is whole. What `continues` has digits after a decimal mark. */
function decimalMark(text: string, points: number, commas: number, continues: boolean): '.' | ',' | null {
  if (points > 1 && commas > 1) refuse('There is more than one number here. Paste the digits of one number.')
  if (points > 1) {
    if (commas === 1 && text.lastIndexOf('.') < text.indexOf(',') && /^\d{1,3}(\.\d{3})+,/.test(text)) return ','
    refuse('There is more than one point, so this may be more than one number. Paste the digits of one number.')
  }
  if (points === 1 && commas === 0) return '.'
  if (points === 1) {
    const commasFollow = text.indexOf(',') > text.indexOf('.')
    if (commasFollow && /^\d{1,3}\.\d{3},\d+$/.test(text)) refuse('Either the point or the comma may be the decimal mark. Write the number with one mark only.')
    return '.'
  }
  if (commas === 0) return null
  if (commas > 1) return /^\d{1,3}(,\d{3})+$/.test(text) ? null : refuse('There is more than one comma, so this may be more than one number. Paste the digits of one number.')
  if (!continues && /^[1-9]\d{0,2},\d{3}$/.test(text)) refuse('The comma may be a decimal mark or may group thousands. Write the number with a point, or without the comma.')
  return ','
}

/** Whole part: plain, or in threes from the right. */
function joinThousands(text: string): string {
  const trimmed = text.trim()
  if (/^\d*$/.test(trimmed) || /^\d{1,3}([\s,.']+\d{3})+$/.test(trimmed)) return trimmed.replace(/\D/g, '')
  return refuse('What stands before the decimal mark is not one whole number. Paste the digits of one number.')
}

/** Digits after the point, in groups of one size; the first and the last may be shorter, and a line may break anywhere. */
function joinGroups(text: string): string {
  const lines = text.split(/\s*\n\s*/).map((line) => line.split(/[\s,']+/).filter((group) => group !== ''))
  for (const [index, groups] of lines.entries()) {
    if (groups.length < 2) continue
    const sizes = groups.map((group) => group.length)
    const size = Math.max(...sizes)
    // Two groups on the first line show no regular size by themselves: the first may lack one digit, the one before the point.
    const regular = sizes.slice(1, -1).every((length) => length === size) && (index > 0 || groups.length > 2 || (sizes[0] ?? 0) >= size - 1)
    if (!regular || size > 10 || size < 2) refuse('The groups of digits are of unequal size, so this may be more than one number. Paste the digits of one number, or join them.')
  }
  const fraction = lines.flat().join('')
  if (/\D/.test(fraction)) refuse('There is more than one decimal mark.')
  return fraction
}

/** Multiplies by a power of ten. Digits that were not written are never filled in before the point. */
function movePoint(integer: string, fraction: string, exponent: number): { integer: string; fraction: string } {
  if (exponent > fraction.length) refuse('With this exponent some digits before the point are not written out.')
  if (exponent >= 0) return { integer: integer + fraction.slice(0, exponent), fraction: fraction.slice(exponent) }
  const padded = integer.padStart(1 - exponent, '0')
  return { integer: padded.slice(0, exponent), fraction: padded.slice(exponent) + fraction }
}
