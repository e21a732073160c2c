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
  file: boolean
}

const lineOf = (name: string, milliseconds: readonly number[], file: boolean): Line => {
  const sorted = [...milliseconds].sort((a, b) => a - b)
  return { name, requests: sorted.length, median: quantile(sorted, 0.5), p99: quantile(sorted, 0.99), most: sorted.at(-1) ?? 0, file }
}

/** One line a way of asking, then lists and files as wholes. */
export function linesOf(measured: Iterable<Measured>): Line[] {
  const all = [...measured]
  const together = (file: boolean) => all.filter(({ visit }) => (visit.file ?? false) === file).flatMap(({ milliseconds }) => milliseconds)
  return [
    ...all.map(({ visit, milliseconds }) => lineOf(`${visit.route}  ${visit.what}`, milliseconds, visit.file ?? false)),
    lineOf('all lists, pages and look-ups', together(false), false),
    lineOf('all files of many rows', together(true), true),
  ]
}

/** Lines that are too slow. Files of many rows are held to nothing here: how long they take depends on how many rows are asked for. */
export const tooSlow = (lines: readonly Line[]): Line[] => lines.filter(({ median, p99, file }) => !file && (median > MEDIAN_MS || p99 > P99_MS))

export function table(lines: readonly Line[]): string {
  const width = Math.max(...lines.map(({ name }) => name.length))
  const cells = (name: string, numbers: readonly string[]) => name.padEnd(width) + numbers.map((number) => number.padStart(10)).join('')
  const slow = new Set(tooSlow(lines))
  return [
    cells('', ['requests', 'median ms', 'p99 ms', 'most ms']),
    ...lines.map((line) => cells(line.name, [String(line.requests), ...[line.median, line.p99, line.most].map((milliseconds) => milliseconds.toFixed(0))]) + (slow.has(line) ? '  too slow' : '')),
  ].join('\n')
}
