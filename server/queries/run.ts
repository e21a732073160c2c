import type { z } from 'zod'
import { parseConstantNumber } from '../../shared/constant-number.ts'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import { hasRight } from '../../shared/permissions.ts'
import type { Run, RunSummary, runQuery } from '../../shared/schemas/run.ts'
import { select, selectByKey, selectOne } from '../db.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { readCursor, writeCursor } from './cursor.ts'

/** A run as lists show it. */
export interface RunRow {
  id: string
  number: number
  definition: unknown
  latex: string
  text: string
  aliases: string[]
  group_id: string
  group_name: string
  started_by: string
  starter_name: string
  state: RunSummary['state']
  method: RunSummary['method']
  arithmetic: RunSummary['arithmetic']
  goal: RunSummary['goal']
  progress: string
  purpose: RunSummary['purpose']
  claim_number: number | null
  claim_ordinal: number | null
  created_at: Date
  started_at: Date | null
  finished_at: Date | null
  digits: { truncated: number; rounded: number } | null
  at: string
}

const COLUMNS = `r.id, c.number, CASE WHEN pg_column_size(c.definition) < 4000 THEN c.definition END AS definition, c.latex, c.text, c.aliases, r.group_id, g.name AS group_name,
  r.started_by, m.name AS starter_name, r.state, r.method, r.arithmetic, r.goal, r.progress, r.purpose, cc.number AS claim_number, cl.ordinal AS claim_ordinal,
  r.created_at, r.started_at, r.finished_at, r.outcome->'digits' AS digits, r.created_at::text AS at`
const FROM = `FROM runs r JOIN constants c ON c.id = r.constant_id JOIN groups g ON g.id = r.group_id JOIN members m ON m.id = r.started_by
  LEFT JOIN claims cl ON cl.id = r.claim_id LEFT JOIN constants cc ON cc.id = cl.constant_id`

/** The runs that a member may see, newest first. */
export async function listRuns(reader: SignedInMember, { cursor, limit, ...query }: z.output<typeof runQuery>): Promise<{ rows: RunRow[]; next: string | null }> {
  const mark = { list: 'runs', reader: reader.id, ...query }
  const bind: Record<string, unknown> = { me: reader.id, limit: limit + 1 }
  const where: string[] = []
  if (query.state) {
    where.push('r.state = $state')
    bind.state = query.state
  }
  if (query.constant) {
    where.push('r.constant_id = (SELECT id FROM constants WHERE number = $number)')
    bind.number = parseConstantNumber(query.constant) ?? 0
  }
  if (cursor !== undefined) {
    const [at, id] = readCursor(mark, cursor)
    where.push('(r.created_at, r.id) < ($at::timestamptz, $id::uuid)')
    Object.assign(bind, { at, id })
  }
  const ways = ['r.started_by = $me']
  if (!query.mine && hasRight(reader.roles, 'group-work.read')) {
    ways.push('r.group_id = $group')
    bind.group = reader.groupId
  }
  // Both ways have an index in the order of the list; so no more of each is read than the page can hold.
  const pages = ways.map((way) => `(SELECT r.id, r.created_at FROM runs r WHERE ${[way, ...where].join(' AND ')} ORDER BY r.created_at DESC, r.id DESC LIMIT $limit)`)
  const rows = await select<RunRow>(
    `SELECT ${COLUMNS} ${FROM} WHERE r.id IN (SELECT id FROM (${pages.join(' UNION ')}) open ORDER BY created_at DESC, id DESC LIMIT $limit) ORDER BY r.created_at DESC, r.id DESC`,
    bind,
  )
  const page = rows.slice(0, limit)
  const last = page.at(-1)
  return { rows: page, next: rows.length > limit && last ? writeCursor(mark, [last.at, last.id]) : null }
}

export interface RunDetailRow extends RunRow {
  /** Estimates that it may not rest on. */
  without: string[]
  forecast_seconds: string | null
  cpu_ms: string
  seconds_left: string | null
  shards_done: number
  shards_total: number | null
  outcome: Outcome | null
  certificate_digest: string | null
  failure: string | null
}

/** One run by id, whoever may see it: the policy decides on the row. */
export async function findRun(id: string): Promise<RunDetailRow | undefined> {
  const [row] = await selectByKey<RunDetailRow>(
    `SELECT ${COLUMNS}, coalesce(r.request::jsonb->'without', '[]') AS without, r.forecast_seconds, r.cpu_ms, r.seconds_left, r.shards_done, r.shards_total, r.outcome, r.certificate_digest, r.failure ${FROM} WHERE r.id = $id`,
    { id },
  )
  return row
}

/** Claims that were registered from a run. */
export async function claimsOfRun(runId: string): Promise<{ id: string; number: number; ordinal: number | null; state: string }[]> {
  return select('SELECT cl.id, c.number, cl.ordinal, cl.state FROM claims cl JOIN constants c ON c.id = cl.constant_id WHERE cl.run_id = $runId ORDER BY cl.created_at', { runId })
}

/** What those who follow a run are told. */
export interface RunEventRow {
  state: Run['state']
  progress: string
  shards_done: number
  shards_total: number | null
  seconds_left: string | null
  cpu_ms: string
  lo: string | null
  hi: string | null
}

export async function runEventOf(id: string): Promise<RunEventRow | undefined> {
  return selectOne<RunEventRow>(
    `SELECT state, progress, shards_done, shards_total, seconds_left, cpu_ms, coalesce(outcome->'enclosure'->>'lo', interim_lo) AS lo, coalesce(outcome->'enclosure'->>'hi', interim_hi) AS hi
     FROM runs WHERE id = $id`,
    { id },
  )
}
