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

/** A file by its parts: what stands before the rows, each row (told whether it is the first), and what stands after them. */
interface Writer {
  head: string
  row: (row: ConstantRow, first: boolean) => string
  tail: string
}

/** Under which name and as what a file is sent. */
export const exportFile = (format: ExportFormat): { type: string; name: string } => ({ type: TYPES[format].type, name: `merestone-register.${TYPES[format].extension}` })

type Pages = AsyncGenerator<ConstantRow[], void>

/** The register's rows as a file, a piece for each page of rows, the first of which is there. Every number is rounded outward where it is not whole. */
export async function* exportConstants(first: Awaited<ReturnType<Pages['next']>>, rest: Pages, format: ExportFormat): AsyncGenerator<string, void> {
  const { head, row, tail } = WRITERS[format]
  yield head
  let isFirst = true
  for (let page = first; !page.done; page = await rest.next()) {
    yield page.value.map((one) => {
      const written = row(one, isFirst)
      isFirst = false
      return written
    }).join('')
  }
  yield tail
}

const csvLine = (cells: readonly (string | number)[]): string => cells.map(csvField).join(',') + '\r\n'

const csv: Writer = {
  head: csvLine(['number', 'definition', 'lo', 'hi', 'digits_truncated', 'digits_rounded', 'state', 'in_conflict', 'group', 'changed', 'address']),
  row: (row) => csvLine([
    constantNumberText(row.number), row.text, row.best_lo ?? '', row.best_hi ?? '', row.digits_truncated ?? '', row.digits_rounded ?? '',
    row.state, row.in_conflict ? 'yes' : 'no', row.group_name, row.changed_at.toISOString(), constantAddress(row.number),
  ]),
  tail: '',
}

/** Quoted where it must be (RFC 4180). A name that a spreadsheet would run as a formula is made plain text; numbers stay numbers. */
function csvField(value: string | number): string {
  const text = String(value)
  const safe = /^[=+@\t\r]|^-(?!\d)/.test(text) ? `'${text}` : text
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

const json: Writer = {
  head: '{\n  "items": [',
  row: (row, first) => `${first ? '' : ','}\n    ${JSON.stringify({ ...presentConstantSummary(row), address: constantAddress(row.number) })}`,
  tail: '\n  ]\n}\n',
}

const bibtex: Writer = { head: '', row: (row, first) => `${first ? '' : '\n'}${citeConstant(row).bibtex}\n`, tail: '' }

/** A table for the package booktabs. */
const latex: Writer = {
  head: ['% \\usepackage{amsmath,booktabs}', '\\begin{tabular}{llll}', '  \\toprule', '  Number & Definition & Value & Digits \\\\', '  \\midrule', ''].join('\n'),
  row: (row) => {
    const best = bestOf(row)
    const value = best ? `$${printed(best.lo, best.hi)}$` : '--'
    return `  ${constantNumberText(row.number)} & $\\displaystyle ${row.latex}$ & ${value} & ${best ? best.digits.truncated : '--'} \\\\\n`
  },
  tail: '  \\bottomrule\n\\end{tabular}\n',
}

const WRITERS: Record<ExportFormat, Writer> = { csv, json, bibtex, latex }

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
