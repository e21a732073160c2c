import type { Measured } from './load-readers.ts'
import { EXPORTS, PAGES, type Visit } from './load-visits.ts'

/** Milliseconds that an answer may take, half of all and all but one of a hundred: of lists, filters and look-ups, and of pages. Files take as long as they are. */
const LIMITS = { list: { median: 100, p99: 300 }, page: { median: 250, p99: 600 }, file: { median: Infinity, p99: Infinity } }

/** The value below which this share of the sorted numbers lies. */
const quantile = (sorted: readonly number[], share: number): number => sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)] ?? 0

export interface Line {
  name: string
  kind: keyof typeof LIMITS
  requests: number
  median: number
  p99: number
  most: number
}

const lineOf = (name: string, kind: Line['kind'], milliseconds: readonly number[]): Line => {
  const sorted = [...milliseconds].sort((a, b) => a - b)
  return { name, kind, requests: sorted.length, median: quantile(sorted, 0.5), p99: quantile(sorted, 0.99), most: sorted.at(-1) ?? 0 }
}

const kindOf = (visit: Visit): Line['kind'] => (EXPORTS.includes(visit) ? 'file' : PAGES.has(visit.route) ? 'page' : 'list')

/** One line a way of asking. */
export const linesOf = (measured: Iterable<Measured>): Line[] => [...measured].map(({ visit, milliseconds }) => lineOf(`${visit.route}  ${visit.what}`, kindOf(visit), milliseconds))

/** All ways of asking as one. */
export const together = (measured: Iterable<Measured>): Line => lineOf('all of these', 'list', [...measured].flatMap(({ milliseconds }) => milliseconds))

export const tooSlow = (lines: readonly Line[]): Line[] => lines.filter(({ kind, median, p99 }) => median > LIMITS[kind].median || p99 > LIMITS[kind].p99)

export function table(lines: readonly Line[]): string {
  const width = Math.max(...lines.map(({ name }) => name.length))
  const cells = (name: string, numbers: readonly string[]) => name.padEnd(width) + numbers.map((number) => number.padStart(10)).join('')
  const slow = new Set(tooSlow(lines))
  return [
    cells('', ['requests', 'median ms', 'p99 ms', 'most ms']),
    ...lines.map((line) => cells(line.name, [String(line.requests), ...[line.median, line.p99, line.most].map((milliseconds) => milliseconds.toFixed(0))]) + (slow.has(line) ? '  too slow' : '')),
  ].join('\n')
}
