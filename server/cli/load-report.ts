import type { Measured } from './load-readers.ts'

/** Milliseconds that an answer may take: half of all, and all but one of a hundred. */
export const MEDIAN_MS = 100
export const P99_MS = 300

/** The value below which this share of the sorted numbers lies. */
const quantile = (sorted: readonly number[], share: number): number => sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)] ?? 0

export interface Line {
  name: string
  requests: number
  median: number
  p99: number
  most: number
}

const lineOf = (name: string, milliseconds: readonly number[]): Line => {
  const sorted = [...milliseconds].sort((a, b) => a - b)
  return { name, requests: sorted.length, median: quantile(sorted, 0.5), p99: quantile(sorted, 0.99), most: sorted.at(-1) ?? 0 }
}

/** One line a way of asking. */
export const linesOf = (measured: Iterable<Measured>): Line[] => [...measured].map(({ visit, milliseconds }) => lineOf(`${visit.route}  ${visit.what}`, milliseconds))

/** All ways of asking as one. */
export const together = (measured: Iterable<Measured>): Line => lineOf('all of these', [...measured].flatMap(({ milliseconds }) => milliseconds))

export const tooSlow = (lines: readonly Line[]): Line[] => lines.filter(({ median, p99 }) => median > MEDIAN_MS || p99 > P99_MS)

export function table(lines: readonly Line[]): string {
  const width = Math.max(...lines.map(({ name }) => name.length))
  const cells = (name: string, numbers: readonly string[]) => name.padEnd(width) + numbers.map((number) => number.padStart(10)).join('')
  const slow = new Set(tooSlow(lines))
  return [
    cells('', ['requests', 'median ms', 'p99 ms', 'most ms']),
    ...lines.map((line) => cells(line.name, [String(line.requests), ...[line.median, line.p99, line.most].map((milliseconds) => milliseconds.toFixed(0))]) + (slow.has(line) ? '  too slow' : '')),
  ].join('\n')
}
