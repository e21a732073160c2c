import { latexInterval, latexNumber, splitEnclosure } from '../../shared/digits.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import type { ConstantRow } from '../queries/constant.ts'
import { presentConstantSummary } from './constant.ts'
import { bestOf } from './constant-value.ts'
import { citeConstant, constantAddress } from './constant-cite.ts'

export const EXPORT_FORMATS = ['csv', 'json', 'bibtex', 'latex'] as const
export type ExportFormat = (typeof EXPORT_FORMATS)[number]

/** Places that a table for print shows at most; what is longer is cut outward. */
const PRINTED_PLACES = 30

const TYPES: Record<ExportFormat, { type: string; extension: string }> = {
  csv: { type: 'text/csv; charset=utf-8', extension: 'csv' },
  json: { type: 'application/json; charset=utf-8', extension: 'json' },
  bibtex: { type: 'application/x-bibtex; charset=utf-8', extension: 'bib' },
  latex: { type: 'application/x-latex; charset=utf-8', extension: 'tex' },
}

/** The register's rows as a file. Every number is rounded outward where it is not whole. */
export function exportConstants(rows: readonly ConstantRow[], format: ExportFormat): { text: string; type: string; name: string } {
  const writers = { csv, json, bibtex, latex } satisfies Record<ExportFormat, (rows: readonly ConstantRow[]) => string>
  const { type, extension } = TYPES[format]
  return { text: writers[format](rows), type, name: `merestone-register.${extension}` }
}

function csv(rows: readonly ConstantRow[]): string {
  const head = ['number', 'definition', 'lo', 'hi', 'digits_truncated', 'digits_rounded', 'state', 'in_conflict', 'group', 'changed', 'address']
  const lines = rows.map((row) => [
    constantNumberText(row.number), row.text, row.best_lo ?? '', row.best_hi ?? '', row.digits_truncated ?? '', row.digits_rounded ?? '',
    row.state, row.in_conflict ? 'yes' : 'no', row.group_name, row.changed_at.toISOString(), constantAddress(row.number),
  ])
  return [head, ...lines].map((line) => line.map(csvField).join(',') + '\r\n').join('')
}

/** Quoted where it must be (RFC 4180). A name that a spreadsheet would run as a formula is made plain text; numbers stay numbers. */
function csvField(value: string | number): string {
  const text = String(value)
  const safe = /^[=+@\t\r]|^-(?!\d)/.test(text) ? `'${text}` : text
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

const json = (rows: readonly ConstantRow[]): string => JSON.stringify({ items: rows.map((row) => ({ ...presentConstantSummary(row), address: constantAddress(row.number) })) }, null, 2) + '\n'

const bibtex = (rows: readonly ConstantRow[]): string => rows.map((row) => citeConstant(row).bibtex + '\n').join('\n')

/** A table for the package booktabs. */
function latex(rows: readonly ConstantRow[]): string {
  const lines = rows.map((row) => {
    const best = bestOf(row)
    const value = best ? `$${printed(best.lo, best.hi)}$` : '--'
    return `  ${constantNumberText(row.number)} & $\\displaystyle ${row.latex}$ & ${value} & ${best ? best.digits.truncated : '--'} \\\\`
  })
  return [
    '% \\usepackage{amsmath,booktabs}',
    '\\begin{tabular}{llll}',
    '  \\toprule',
    '  Number & Definition & Value & Digits \\\\',
    '  \\midrule',
    ...lines,
    '  \\bottomrule',
    '\\end{tabular}',
    '',
  ].join('\n')
}

/** The certified digits with dots, cut where they are many; the interval, cut outward, where there are too few of them. */
function printed(lo: string, hi: string): string {
  if (lo === hi) return latexNumber(lo)
  const { integer, decimals, negative, lowerNext, upperNext } = splitEnclosure(lo, hi, 2)
  if (integer === null) return latexInterval(lowerNext, upperNext)
  const shared = `${negative ? '-' : ''}${integer}`
  if (decimals.length >= 4) return `${latexNumber(`${shared}.${decimals.slice(0, PRINTED_PLACES)}`)}\\ldots`
  const certified = decimals === '' ? shared : `${shared}.${decimals}`
  return latexInterval(certified + lowerNext, certified + upperNext)
}
