import { LIMITS } from '../../limits.ts'

/** What a text says of a list of integers. */
export interface ParsedList {
  /** Distinct integers >= 2, ascending, as decimal strings. */
  members: string[]
  /** Entries that say an integer again. */
  repeated: number
  /** Entries that are no integer of a list, by line; at most MOST_REPORTED of them. */
  bad: BadEntry[]
  badCount: number
}

export interface BadEntry {
  /** Counted from 1. */
  line: number
  text: string
  reason: string
}

export const MOST_REPORTED = 200
/** As many digits as a member of a finite set may have. */
const MOST_DIGITS = 40
const SEPARATORS = /[\s,;]+/

/**
 * Reads integers out of plain text or CSV: separated by line ends, blanks, commas or semicolons, with or without quotation
 * marks. Empty lines, what follows a #, and a heading on the first line are passed over. What is wrong is told by its line and
 * the rest is kept.
 */
export function parseList(text: string): ParsedList {
  const bad: BadEntry[] = []
  let badCount = 0
  const found: string[] = []
  const lines = text.replace(/^\ufeff/, '').split(/\r\n|\r|\n/)
  lines.forEach((whole, index) => {
    const line = whole.replace(/#.*/, '').replaceAll('"', ' ').trim()
    if (line === '' || (index === 0 && !/\d/.test(line))) return
    for (const entry of line.split(SEPARATORS)) {
      if (entry === '') continue
      const reason = fault(entry) ?? (found.length >= LIMITS.members ? `a list holds at most ${LIMITS.members} integers` : null)
      if (reason === null) {
        found.push(entry.replace(/^\+?0*(?=\d)/, ''))
        continue
      }
      badCount++
      if (bad.length < MOST_REPORTED) bad.push({ line: index + 1, text: entry.slice(0, 60), reason })
    }
  })
  const members = [...new Set(found)].sort((a, b) => a.length - b.length || (a < b ? -1 : 1))
  return { members, repeated: found.length - members.length, bad, badCount }
}

/** Why an entry is no member; null where it is one. */
function fault(entry: string): string | null {
  if (/^[+-]?\d+$/.test(entry)) {
    if (entry.startsWith('-')) return 'negative'
    const digits = entry.replace(/^\+?0*/, '')
    if (digits === '' || digits === '1') return 'below 2'
    return digits.length > MOST_DIGITS ? `more than ${MOST_DIGITS} digits` : null
  }
  return /^[+-]?\d*\.\d+$|^[+-]?\d+(\.\d*)?[eE]/.test(entry) ? 'not written as a whole number' : 'not a number'
}
