import type { z } from 'zod'
import type { OutboxItem, outboxQuery } from '../../shared/schemas/group.ts'
import { select } from '../db.ts'
import { presentOutboxItem } from '../presenters/outbox.ts'
import { readCursor, writeCursor } from './cursor.ts'

/** A row of `outbox` without the mail's text, which is for its recipient only. */
export interface OutboxRow {
  id: string
  group_id: string | null
  recipient_name: string
  recipient_email: string
  template: string
  subject: string
  state: OutboxItem['state']
  attempts: number
  next_attempt_at: Date
  last_error: string | null
  created_at: Date
  sent_at: Date | null
  /** Exact, for the cursor: a Date has milliseconds only. */
  created_text: string
}

export const OUTBOX_COLUMNS =
  'id, group_id, recipient_name, recipient_email, template, subject, state, attempts, next_attempt_at, last_error, created_at, sent_at, created_at::text AS created_text'

/** A page of the mails of a group, newest first. */
export async function listOutbox(groupId: string, query: z.output<typeof outboxQuery>): Promise<{ items: OutboxItem[]; next: string | null }> {
  const { cursor, limit, state } = query
  const mark = { list: 'outbox', groupId, state }
  const [createdAt, id] = cursor === undefined ? [] : readCursor(mark, cursor)
  const rows = await select<OutboxRow>(
    `SELECT ${OUTBOX_COLUMNS} FROM outbox WHERE group_id = $groupId
       ${state === undefined ? '' : 'AND state = $state'}
       ${cursor === undefined ? '' : 'AND (created_at, id) < ($createdAt::timestamptz, $id::uuid)'}
     ORDER BY created_at DESC, id DESC LIMIT $limit`,
    { groupId, limit: limit + 1, ...(state !== undefined && { state }), ...(cursor !== undefined && { createdAt, id }) },
  )
  const page = rows.slice(0, limit)
  const last = page.at(-1)
  return { items: page.map(presentOutboxItem), next: rows.length > limit && last ? writeCursor(mark, [last.created_text, last.id]) : null }
}
