import { createHash } from 'node:crypto'
import { z } from 'zod'
import { canonicalJson } from '../audit/canonical.ts'
import { invalidField } from '../errors.ts'

/**
 * Cursors of lists. A cursor holds the sort key of the last row that was sent and a mark of the query it belongs to (filters,
 * sorting, reader's group): one that is taken to another query is refused, since its position means nothing there.
 */
const content = z.object({ query: z.string(), key: z.array(z.union([z.string().max(20_000), z.number(), z.null()])).min(1).max(4) })
export type CursorKey = z.infer<typeof content>['key']

function mark(query: unknown): string {
  return createHash('sha256').update(canonicalJson(query)).digest('base64url').slice(0, 16)
}

/** The text that is sent as `next`. */
export function writeCursor(query: unknown, key: CursorKey): string {
  return Buffer.from(JSON.stringify({ query: mark(query), key })).toString('base64url')
}

/** The sort key in a cursor of this very query; refuses any other. */
export function readCursor(query: unknown, cursor: string): CursorKey {
  let parsed
  try {
    parsed = content.safeParse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')))
  } catch {
    throw invalidField('cursor', 'is not a cursor of this list: begin at the first page')
  }
  if (!parsed.success) throw invalidField('cursor', 'is not a cursor of this list: begin at the first page')
  if (parsed.data.query !== mark(query)) throw invalidField('cursor', 'belongs to a list with other filters or sorting: begin at the first page')
  return parsed.data.key
}
