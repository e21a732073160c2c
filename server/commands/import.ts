import { constantNumberText } from '../../shared/constant-number.ts'
import { parseCsv } from '../../shared/csv.ts'
import { intervalOfDigits } from '../../shared/digit-check.ts'
import { readDigits } from '../../shared/digit-reading.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { intersection } from '../../shared/intersection.ts'
import type { ImportLine, ImportResult } from '../../shared/schemas/import.ts'
import { inTransaction } from '../db.ts'
import { readDefinition, type ReadDefinition, viewDefinition } from '../engine/definition.ts'
import { definitionOfWords } from '../engine/definition-words.ts'
import { invalidField, Problem, tooLarge } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Constant } from '../models/constant.ts'
import { draftClaim } from './claim.ts'
import { stateConstant } from './constant.ts'

const MOST_LINES = 2_000
/** A table is read in the web process, so that its size is what a moment can read: far above any table of a paper. */
const MOST_BYTES = 4 * 1024 * 1024
const COLUMNS = ['definition', 'digits', 'reading', 'source'] as const
/** Most characters of a cell, as in a claim that is typed. Checked before any pattern meets the text. */
const LONGEST = { definition: 200, digits: 20_000, reading: 20, source: 20_000 } as const

/** One line as read: what it asserts, and what the register says to it. */
interface ReadLine {
  shown: ImportLine
  draft?: { read: ReadDefinition | null; constant: Constant | null; digits: string; reading: 'truncated' | 'rounded'; source: string }
}

/** Text of an uploaded file; refuses what is larger than one import, and what is not UTF-8. */
export function textOfFile(content: Buffer): string {
  if (content.length > MOST_BYTES) throw tooLarge(`A table to import has at most ${MOST_BYTES / 1024 / 1024} MB: cut it into parts.`)
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(content)
  } catch {
    throw invalidField('file', 'is not UTF-8 text: save the table as CSV in UTF-8')
  }
}

/** The rows under the heading, each field by its column's name; the columns may stand in any order. */
function rowsOf(text: string): { line: number; row: Record<(typeof COLUMNS)[number], string> }[] {
  const [head, ...records] = parseCsv(text)
  const names = head?.fields.map((field) => field.toLowerCase()) ?? []
  const missing = COLUMNS.filter((name) => !names.includes(name))
  if (missing.length > 0) throw invalidField('file', `has no column ${missing.join(', ')}: the first line names definition, digits, reading and source`)
  if (records.length === 0) throw invalidField('file', 'has no line under its heading')
  if (records.length > MOST_LINES) throw invalidField('file', `has ${records.length.toLocaleString('en')} lines; one import has at most ${MOST_LINES.toLocaleString('en')}: cut it into parts`)
  return records.map(({ line, fields }) => ({
    line,
    row: Object.fromEntries(COLUMNS.map((name) => [name, fields[names.indexOf(name)] ?? ''])) as Record<(typeof COLUMNS)[number], string>,
  }))
}

async function meaningOf(words: string): Promise<{ read: ReadDefinition | null; constant: Constant | null }> {
  const meant = definitionOfWords(words)
  if ('number' in meant) {
    const constant = await Constant.findOne({ where: { number: meant.number } })
    if (!constant) throw invalidField('definition', `There is no ${constantNumberText(meant.number)} in the register.`)
    return { read: null, constant }
  }
  const read = readDefinition(meant)
  return { read, constant: await Constant.findOne({ where: { definitionKey: read.key } }) }
}

async function readLine(line: number, row: Record<(typeof COLUMNS)[number], string>): Promise<ReadLine> {
  const bad = (message: string): ReadLine => ({ shown: { line, verdict: 'bad', message, definition: null, constant: null, enclosure: null } })
  const unfit = COLUMNS.find((name) => row[name].length > LONGEST[name] || row[name].includes('\0'))
  if (unfit) return bad(row[unfit].length > LONGEST[unfit] ? `More than ${LONGEST[unfit].toLocaleString('en')} characters in the column ${unfit}.` : `A character that is none in the column ${unfit}.`)
  const reading = row.reading.toLowerCase()
  if (reading !== 'truncated' && reading !== 'rounded') return bad('The column reading says "truncated" or "rounded".')
  if (row.source === '') return bad('The source is missing.')
  const digits = readDigits(row.digits)
  if (!digits.ok) return bad(`The digits cannot be read: ${digits.reason}`)
  if (digits.number.uncertainty !== null) return bad('An uncertainty does not say whether it is a bound; give digits that the source proves.')
  try {
    const { read, constant } = await meaningOf(row.definition)
    const { latex, text } = read?.view ?? viewDefinition(constant!.definition as Parameters<typeof viewDefinition>[0])
    const enclosure = intervalOfDigits(digits.number, reading)
    const number = constant ? constantNumberText(constant.number) : null
    return { shown: { line, ...verdictOn(constant, enclosure), definition: { latex, text }, constant: number, enclosure }, draft: { read, constant, digits: row.digits, reading, source: row.source } }
  } catch (error) {
    if (error instanceof EngineRefusal) return bad(error.message)
    if (error instanceof Problem) return bad(error.fields?.map(({ message }) => message).join(' ') || error.message)
    throw error
  }
}

function verdictOn(constant: Constant | null, enclosure: { lo: string; hi: string }): Pick<ImportLine, 'verdict' | 'message'> {
  if (!constant) return { verdict: 'new', message: 'A constant that the register does not have yet.' }
  if (constant.bestLo === null || constant.bestHi === null) return { verdict: 'first', message: 'The register has no signed enclosure of it yet.' }
  return intersection([{ lo: constant.bestLo, hi: constant.bestHi }, enclosure])
    ? { verdict: 'meets', message: 'Meets the enclosure in the register.' }
    : { verdict: 'contradicts', message: 'Contradicts the enclosure in the register: they have no number in common.' }
}

/** What an import would do, line by line. Changes nothing. */
export async function previewImport(text: string): Promise<ImportLine[]> {
  const lines: ImportLine[] = []
  for (const { line, row } of rowsOf(text)) lines.push((await readLine(line, row)).shown)
  return lines
}

/** A draft claim for every line that can be read; the others are told with their reasons and leave nothing behind. */
export async function importClaims(member: SignedInMember, text: string): Promise<ImportResult> {
  const result: ImportResult = { drafts: [], left: [] }
  for (const { line, row } of rowsOf(text)) {
    const { shown, draft } = await readLine(line, row)
    if (!draft) {
      result.left.push({ line, message: shown.message })
      continue
    }
    const constant = draft.constant ?? (await inTransaction((transaction) => stateConstant(transaction, member, draft.read!))).constant
    const number = constantNumberText(constant.number)
    const claim = await draftClaim(member, { kind: 'stated', constant: number, value: { digits: draft.digits, reading: draft.reading }, source: draft.source, remark: '' })
    result.drafts.push({ line, claimId: claim.id, constant: number })
  }
  return result
}
