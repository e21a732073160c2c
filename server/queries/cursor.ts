import { createHmac, randomBytes, timingSafeEqual } from 'node:crypto'
import { z } from 'zod'
import { canonicalJson } from '../audit/canonical.ts'
import { dataPath, secretFile } from '../data-folder.ts'
import { invalidField } from '../errors.ts'

/**
 * Cursors of lists. A cursor holds the sort key of the last row that was sent, sealed together with the query that it belongs to
 * (filters, sorting, reader's group): one that is taken to another query is refused, since its position means nothing there, and
 * one that was made by hand never reaches the database.
 */
const content = z.object({ key: z.array(z.union([z.string(), z.number(), z.null()])).min(1).max(4), seal: z.string(), query: z.string() })
export type CursorKey = z.infer<typeof content>['key']

const secret = secretFile(dataPath('cursor-secret'), () => randomBytes(32).toString('base64url'))

const digest = (value: unknown): string => createHmac('sha256', secret).update(canonicalJson(value)).digest('base64url').slice(0, 16)

/** The text that is sent as `next`. */
export function writeCursor(query: unknown, key: CursorKey): string {
  const mark = digest(query)
  return Buffer.from(JSON.stringify({ query: mark, key, seal: digest([mark, key]) })).toString('base64url')
}

/** The sort key in a cursor of this very query; refuses any other. */
export function readCursor(query: unknown, cursor: string): CursorKey {
  const parsed = content.safeParse(parseJson(Buffer.from(cursor, 'base64url').toString('utf8')))
  if (!parsed.success || !same(parsed.data.seal, digest([parsed.data.query, parsed.data.key]))) {
    throw invalidField('cursor', 'is not a cursor of this list: begin at the first page')
  }
  if (parsed.data.query !== digest(query)) throw invalidField('cursor', 'belongs to a list with other filters or sorting: begin at the first page')
  return parsed.data.key
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}

function same(a: string, b: string): boolean {
  const [first, second] = [Buffer.from(a), Buffer.from(b)]
  return first.length === second.length && timingSafeEqual(first, second)
}
