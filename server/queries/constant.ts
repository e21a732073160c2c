import type { z } from 'zod'
import { parseRational, toText } from '../../shared/engine/arithmetic/rational.ts'
import { isPrime } from '../../shared/engine/arithmetic/primes.ts'
import type { ConstantSummary, constantQuery } from '../../shared/schemas/constant.ts'
import { select, selectByKey, type Bind } from '../db.ts'
import { invalid, invalidField, type FieldError } from '../errors.ts'
import { audienceOf, stateColumn, type Reader } from './audience.ts'
import { readTextQuery } from './constant-text.ts'
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
function rowsSql(reader: Reader, { key, order, conditions, limit, total }: { key: string; order: 'asc' | 'desc'; conditions: readonly string[]; limit: string; total?: string }): string {
  return `SELECT ${columns(reader)}${total === undefined ? '' : `, (${total}) AS total`}
    FROM (SELECT e.*, ${key} AS key FROM register_entries e WHERE ${conditions.join(' AND ')} ORDER BY ${key} ${order}, e.number ${order} LIMIT ${limit}) e
    JOIN constants c ON c.id = e.constant_id JOIN groups g ON g.id = e.group_id
    ORDER BY e.key ${order}, e.number ${order}`
}

/** Set kinds that have no k, or one only: a filter by k beside them makes no sense. */
const WITHOUT_K = new Set(['integers', 'squarefree', 'smooth', 'residue-class', 'finite', 'over-primes', 'named'])
const WITH_K = new Set(['primes', 'almost-primes', 'squarefree-almost-primes', 'distinct-prime-factors'])

interface Filter {
  where: string[]
  bind: Bind
}

/** The conditions of a query of the register, over the entries `e` that this reader sees. Refuses what makes no sense. */
export function registerFilter(reader: Reader, query: ConstantQuery): Filter {
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
  if (query.k !== undefined) add('e.k = $k', { k: query.k })
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
  if (query.text !== undefined && query.text !== '') textFilter(query.text, add)
  if (faults.length > 0) throw invalid(faults)
  return { where, bind }
}

function textFilter(text: string, add: (condition: string, values: Bind) => void): void {
  const asked = readTextQuery(text)
  if (Object.keys(asked).length === 1 && asked.words.length === 0) throw invalidField('text', 'says nothing to search for: write words, a definition such as "odd, k = 3", or leading digits such as 1.6366')
  if (asked.number !== undefined) add('e.number = $textNumber', { textNumber: asked.number })
  if (asked.power !== undefined) add('e.power = $textPower AND e.log_power = $textLogPower', { textPower: asked.power, textLogPower: asked.logPower })
  if (asked.overPrimes && asked.k === undefined) add(`e.set_kind IN ('primes', 'residue-class')`, {})
  if (asked.k !== undefined) add('e.k = $textK', { textK: asked.k })
  if (asked.odd) add(`(e.exclude = '2' OR e.exclude LIKE '2,%')`, {})
  if (asked.exclude) add('e.exclude = $textExclude', { textExclude: asked.exclude.join(',') })
  if (asked.digits !== undefined) {
    const [lo, hi] = leadingDigits(asked.digits)
    const meets = MEETS('$digitsLo', '$digitsHi')
    // Many digits mean few constants, which the index on ranges finds first; of few digits a walk in order soon has a page.
    const few = (asked.digits.split('.')[1]?.length ?? 0) >= FEW_FROM_DECIMALS
    add(few ? `e.constant_id = ANY (ARRAY(SELECT constant_id FROM register_entries WHERE audience = $audience AND ${meets}))` : meets, { digitsLo: lo, digitsHi: hi })
  }
  if (asked.words.length > 0) add(`e.constant_id IN (SELECT id FROM constants WHERE search @@ to_tsquery('simple', $words))`, { words: asked.words.map((word) => `${word}:*`).join(' & ') })
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
): Promise<{ rows: ConstantRow[]; next: string | null; total?: number }> {
  const { where, bind } = registerFilter(reader, query)
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
  const first = cursor === undefined
  const rows = await select<ConstantRow & { total: number }>(
    rowsSql(reader, { key, order: query.order, conditions, limit: '$limit', ...(first && { total: where.length === 1 ? countAllSql(reader) : countSql(where) }) }),
    { ...bind, limit: limit + 1 },
  )
  const counted = rows[0]?.total ?? 0
  const total = first && (where.length === 1 || counted <= MOST_COUNTED) ? counted : undefined
  const page = rows.slice(0, limit)
  const last = page.at(-1)
  const after: CursorKey | null = rows.length > limit && last ? [query.sort === 'value' ? null : last.sort_key, last.number] : null
  return { rows: page, next: after && writeCursor(mark, after), ...(total !== undefined && { total }) }
}

/** Decimals from which on digits mean few constants. */
const FEW_FROM_DECIMALS = 3

/** Most that is counted of a filtered list, so that counting never costs more than listing. */
const MOST_COUNTED = 300

const countSql = (where: readonly string[]): string => `SELECT count(*)::int FROM (SELECT 1 FROM register_entries e WHERE ${where.join(' AND ')} ORDER BY e.number LIMIT ${MOST_COUNTED + 1}) AS counted`

/** The whole register: to members every constant is known, and numbers have no gaps. */
const countAllSql = (reader: Reader): string =>
  `SELECT ${reader ? 'coalesce(max(number), 0)' : 'count(*)::int'} FROM register_entries WHERE audience = $audience`

/** Every row of a query, for an export, up to `most`. */
export async function allConstants(reader: Reader, query: ConstantQuery, most: number): Promise<ConstantRow[]> {
  const { where, bind } = registerFilter(reader, query)
  const [key] = sorting(query)
  return select<ConstantRow>(rowsSql(reader, { key, order: query.order, conditions: where, limit: '$most' }), { ...bind, most })
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
