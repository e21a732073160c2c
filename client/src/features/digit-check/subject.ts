import { claimNumberText, constantNumberText } from '../../../../shared/constant-number.ts'
import { readInterval } from './check.ts'

/** What digits are held against, as somebody wrote it. */
export type Subject =
  | { kind: 'none' }
  | { kind: 'constant'; number: string }
  | { kind: 'claim'; number: string }
  | { kind: 'interval'; lo: string; hi: string }
  | { kind: 'unreadable'; reason: string }

const NUMBER = /^(?:mst)?[-\s]?0*([1-9]\d{0,8})(?:\s*[/-]\s*0*([1-9]\d{0,5}))?$/i

/** Reads "MST-0042", "mst 42", "MST-0042/1" or an interval. A bare "42" is no number of a constant, so that 1.5 is never half-read as one. */
export function readSubject(text: string): Subject {
  const trimmed = text.trim()
  if (trimmed === '') return { kind: 'none' }
  const match = /^mst/i.test(trimmed) ? NUMBER.exec(trimmed) : null
  if (match) {
    const [, constant, ordinal] = match
    return ordinal === undefined ? { kind: 'constant', number: constantNumberText(Number(constant)) } : { kind: 'claim', number: claimNumberText(Number(constant), Number(ordinal)) }
  }
  if (/^mst/i.test(trimmed)) return { kind: 'unreadable', reason: 'Write a constant as MST-0042 and a claim as MST-0042/1.' }
  const interval = readInterval(trimmed)
  return interval.ok ? { kind: 'interval', lo: interval.lo, hi: interval.hi } : { kind: 'unreadable', reason: `${interval.reason} Or name a constant or claim, such as MST-0042 or MST-0042/1.` }
}
