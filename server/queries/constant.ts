import type { z } from 'zod'
import { parseRational, toText } from '../../shared/engine/arithmetic/rational.ts'
import { isPrime } from '../../shared/engine/arithmetic/primes.ts'
import type { ConstantSummary, constantQuery } from '../../shared/schemas/constant.ts'
import { select, selectByKey, type Bind } from '../db.ts'
import { invalid, invalidField, type FieldError } from '../errors.ts'
import { audienceOf, stateColumn, type Reader } from './audience.ts'
import { readTextQuery, type TextQuery } from './constant-text.ts'
import { readCursor, writeCursor, type CursorKey } from './cursor.ts'
import { leadingDigits } from './leading-digits.ts'
import { MEETS } from './look-up.ts'

export type ConstantQuery = Omit<z.output<typeof constantQuery>, 'cursor' | 'limit'>

export interface ConstantRow {
  id: string
  number: number
  definition: unknown
  latex: string
  text: string
  aliases: string[]
  state: ConstantSummary['state']
  in_conflict: boolean
  best_lo: string | null
  best_hi: string | null
  digits_truncated: number | null
  digits_rounded: number | null
  group_id: string
  group_name: string
  changed_at: Date
  sort_key: string | null
}

const columns = (reader: Reader): string => `c.id, c.number, CASE WHEN pg_column_size(c.definition) < 4000 THEN c.definition END AS definition,
  c.latex, c.text, c.aliases, e.${stateColumn(reader)} AS state, e.in_conflict, e.best_lo, e.best_hi, e.digits_truncated, e.digits_rounded,
  g.id AS group_id, g.name AS group_name, e.changed_at, e.key::text AS sort_key`

/** Entries that fit, in order, with what is shown of them: filters and order need the entries alone, so only what is shown is joined. */
function rowsSql(reader: Reader, { key, order, conditions, limit, total = null }: { key: string; order: 'asc' | 'desc'; conditions: readonly string[]; limit: string; total?: string | null }): string {
  return `SELECT ${columns(reader)}${total === null ? '' : `, (${total}) AS total`}
    FROM (SELECT e.*, ${key} AS key${total === COUNT_FOUND ? ', count(*) OVER ()::int AS found' : ''} FROM register_entries e WHERE ${conditions.join(' AND ')} ORDER BY ${key} ${order}, e.number ${order} LIMIT ${limit}) e
    JOIN constants c ON c.id = e.constant_id JOIN groups g ON g.id = e.group_id
    ORDER BY e.key ${order}, e.number ${order}`
}

/** Set kinds that have no k, or one only: a filter by k beside them makes no sense. */
const WITHOUT_K = new Set(['integers', 'squarefree', 'smooth', 'residue-class', 'finite', 'over-primes', 'named'])
const WITH_K = new Set(['primes', 'almost-primes', 'squarefree-almost-primes', 'distinct-prime-factors'])

interface Filter {
  where: string[]
  bind: Bind
  /** How many constants have the words and digits that are asked for, if any are. */
  matched: 'few' | 'many' | null
}

/** The conditions of a query of the register, over the entries `e` that this reader sees. Refuses what makes no sense. */
async function registerFilter(reader: Reader, query: ConstantQuery): Promise<Filter> {
  const where = ['e.audience = $audience']
  const bind: Bind = { audience: audienceOf(reader) }
  const faults: FieldError[] = []
  const add = (condition: string, values: Bind): void => {
    where.push(condition)
    Object.assign(bind, values)
  }
  if (query.set !== undefined) {
    if (!WITH_K.has(query.set) && !WITHOUT_K.has(query.set)) faults.push({ path: 'set', message: 'there is no such set' })
    else if (query.k !== undefined && WITHOUT_K.has(query.set)) faults.push({ path: 'k', message: 'this set has no k' })
    add('e.set_kind = $set', { set: query.set })
  }
  // As the index by k has it.
  if (query.k !== undefined) add('coalesce(e.k, 0) = $k', { k: query.k })
  for (const [field, column] of [['power', 'power'], ['logPower', 'log_power']] as const) {
    const text = query[field]
    if (text === undefined) continue
    const value = parseRational(text)
    if (value === null) faults.push({ path: field, message: 'write a whole number, a fraction such as 1/2, or a decimal' })
    else add(`e.${column} = $${field}`, { [field]: toText(value) })
  }
  if (query.exclude !== undefined) {
    const primes = query.exclude === 'none' ? [] : [...new Set(query.exclude.split(',').map((text) => (/^\s*\d{1,9}\s*$/.test(text) ? Number(text) : 0)))].sort((a, b) => a - b)
    if (!primes.every(isPrime)) faults.push({ path: 'exclude', message: 'write primes with commas between them, or "none"' })
    add('e.exclude = $exclude', { exclude: primes.join(',') })
  }
  if (query.state !== undefined) add(`e.${stateColumn(reader)} = $state`, { state: query.state })
  if (query.minDigits !== undefined && query.minDigits > 0) add('coalesce(e.digits_truncated, -1) >= $minDigits', { minDigits: query.minDigits })
  if (query.group !== undefined) add('e.group_id = $group', { group: query.group })
  const asked = query.text === undefined || query.text === '' ? null : readTextQuery(query.text)
  if (asked) textFilter(asked, add)
  if (faults.length > 0) throw invalid(faults)
  return { where, bind, matched: asked && (await narrow(reader, asked, add)) }
}

function textFilter(asked: TextQuery, add: (condition: string, values: Bind) => void): void {
  if (Object.keys(asked).length === 1 && asked.words.length === 0) throw invalidField('text', 'says nothing to search for: write words, a definition such as "odd, k = 3", or leading digits such as 1.6366')
  if (asked.number !== undefined) add('e.number = $textNumber', { textNumber: asked.number })
  if (asked.power !== undefined) add('e.power = $textPower AND e.log_power = $textLogPower', { textPower: asked.power, textLogPower: asked.logPower })
  if (asked.overPrimes && asked.k === undefined) add(`e.set_kind IN ('primes', 'residue-class')`, {})
  if (asked.k !== undefined) add('coalesce(e.k, 0) = $textK', { textK: asked.k })
  if (asked.odd) add(`(e.exclude = '2' OR e.exclude LIKE '2,%')`, {})
  if (asked.exclude) add('e.exclude = $textExclude', { textExclude: asked.exclude.join(',') })
}

/** Words that many constants have, as they were found to be: constants are only ever added, so that they stay many. */
const broadWords = new Set<string>()
const MOST_BROAD_WORDS = 1_000

/**
 * Words and digits: where few constants have them they are found first, and the rest of the query looks at those alone; where many
 * have them, a walk in the order of the list soon has a page.
 */
async function narrow(reader: Reader, { words, digits }: TextQuery, add: (condition: string, values: Bind) => void): Promise<Filter['matched']> {
  /** Adds the condition by what few it finds, or as one to walk by; answers whether they are few. */
  const narrowBy = async (name: 'digits' | 'words', found: string, walked: string, values: Bind): Promise<boolean> => {
    const ids = (await select<{ id: string }>(`${found} LIMIT ${narrowing.most + 1}`, values)).map(({ id }) => id)
    const few = ids.length <= narrowing.most
    // A row each: of a long list of values the planner would look at every one.
    if (few) add(`e.constant_id IN (SELECT unnest($${name}Found::uuid[]))`, { [`${name}Found`]: ids })
    else add(walked, values)
    return few
  }
  const byDigits = async (printed: string): Promise<boolean> => {
    const [lo, hi] = leadingDigits(printed)
    const meets = MEETS('$digitsLo', '$digitsHi')
    return narrowBy('digits', `SELECT constant_id AS id FROM register_entries WHERE audience = $audience AND ${meets}`, meets, { audience: audienceOf(reader), digitsLo: lo, digitsHi: hi })
  }
  const byWords = async (asked: string): Promise<boolean> => {
    const has = `SELECT id FROM constants WHERE search @@ to_tsquery('simple', $words)`
    const walked = `e.constant_id IN (${has})`
    if (broadWords.has(asked)) {
      add(walked, { words: asked })
      return false
    }
    const few = await narrowBy('words', has, walked, { words: asked })
    if (!few && broadWords.size < MOST_BROAD_WORDS) broadWords.add(asked)
    return few
  }
  const few = await Promise.all([
    ...(digits === undefined ? [] : [byDigits(digits)]),
    ...(words.length === 0 ? [] : [byWords(words.map((word) => `${word}:*`).join(' & '))]),
  ])
  return few.length === 0 ? null : few.includes(true) ? 'few' : 'many'
}

/** By what each sorting goes, and the type of that; every one has an index. */
function sorting({ sort, order }: ConstantQuery): [key: string, type: string] {
  switch (sort) {
    case 'number':
      return ['e.number', 'int']
    case 'digits':
      return ['coalesce(e.digits_truncated, -1)', 'int']
    case 'value':
      // Constants without an enclosure come last, whichever way.
      return [`coalesce(e.best_lo, '${order === 'asc' ? '' : '-'}Infinity')`, 'numeric']
    case 'changed':
      return ['e.changed_at', 'timestamptz']
    case 'k':
      return ['coalesce(e.k, 0)', 'int']
  }
}

/** A page of the register as this reader sees it. `total` comes with the first page; null where there are very many. */
export async function listConstants(
  reader: Reader,
  { cursor, limit, ...query }: z.output<typeof constantQuery>,
  counted: boolean = cursor === undefined,
): Promise<{ rows: ConstantRow[]; next: string | null; total?: number }> {
  const { where, bind, matched } = await registerFilter(reader, query)
  const mark = { list: 'constants', audience: audienceOf(reader), state: stateColumn(reader), ...query }
  const [key, type] = sorting(query)
  const conditions = [...where]
  if (cursor !== undefined) {
    const [after, number] = readCursor(mark, cursor)
    // A value can have a thousand digits, too many for an address: its row is named and the value read again.
    const position = query.sort === 'value' ? `(SELECT ${key} FROM register_entries e WHERE e.audience = $audience AND e.number = $afterNumber)` : `$after::${type}`
    conditions.push(`(${key}, e.number) ${query.order === 'asc' ? '>' : '<'} (${position}, $afterNumber::int)`)
    Object.assign(bind, query.sort === 'value' ? { afterNumber: number } : { after, afterNumber: number })
  }
  // Few are all found anyway; of a filter that very many fit a bounded count would cost more than the page.
  const total = !counted || matched === 'many' ? null : matched === 'few' ? COUNT_FOUND : where.length === 1 ? COUNT_ALL : countSql(where)
  const rows = await select<ConstantRow & { total: number }>(
    rowsSql(reader, { key, order: query.order, conditions, limit: '$limit', total }),
    { ...bind, limit: limit + 1 },
  )
  const count = rows[0]?.total ?? 0
  const known = total === COUNT_FOUND || total === COUNT_ALL || (total !== null && count <= MOST_COUNTED)
  const page = rows.slice(0, limit)
  const last = page.at(-1)
  const after: CursorKey | null = rows.length > limit && last ? [query.sort === 'value' ? null : last.sort_key, last.number] : null
  return { rows: page, next: after && writeCursor(mark, after), ...(known && { total: count }) }
}

/** Most constants with some words or digits that a query is narrowed to. */
export const narrowing = { most: 1_000 }

/** Most that is counted of a filtered list, so that counting never costs more than listing. */
const MOST_COUNTED = 300

const countSql = (where: readonly string[]): string => `SELECT count(*)::int FROM (SELECT 1 FROM register_entries e WHERE ${where.join(' AND ')} ORDER BY e.number LIMIT ${MOST_COUNTED + 1}) AS counted`

/** All that the same statement finds. */
const COUNT_FOUND = 'e.found'

/** The whole register, as the database counts it. */
const COUNT_ALL = 'SELECT entries FROM register_counts WHERE audience = $audience'

/** Rows of an export that are read at once. */
const ROWS_AT_ONCE = 500

/** Every row of a query, page by page, for an export. */
export async function* allConstants(reader: Reader, query: ConstantQuery, limit = ROWS_AT_ONCE): AsyncGenerator<ConstantRow[], void> {
  let cursor: string | undefined
  do {
    const { rows, next }: { rows: ConstantRow[]; next: string | null } = await listConstants(reader, { ...query, limit, ...(cursor !== undefined && { cursor }) }, false)
    yield rows
    cursor = next ?? undefined
  } while (cursor !== undefined)
}

/** One constant as this reader sees it. */
export async function findConstant(reader: Reader, number: number): Promise<ConstantRow | undefined> {
  const conditions = ['e.audience = $audience', 'e.number = $number']
  const [row] = await selectByKey<ConstantRow>(rowsSql(reader, { key: 'e.number', order: 'asc', conditions, limit: '1' }), { audience: audienceOf(reader), number })
  return row
}

/** Several constants by id. */
export async function constantsById(reader: Reader, ids: string[]): Promise<ConstantRow[]> {
  const conditions = ['e.audience = $audience', 'e.constant_id = ANY($ids::uuid[])']
  return selectByKey<ConstantRow>(rowsSql(reader, { key: 'e.number', order: 'asc', conditions, limit: 'ALL' }), { audience: audienceOf(reader), ids })
}
