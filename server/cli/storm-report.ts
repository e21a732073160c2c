import { select } from '../db.ts'
import type { World } from './storm-crowd.ts'

/** What a storm was, in some lines: how much was asked and answered, what became of the claims, how much is in trail and outbox. */
export async function report({ tally, people }: World, seconds: number): Promise<string> {
  const requests = [...tally.values()].reduce((sum, count) => sum + count, 0)
  const byStatus = new Map<string, number>()
  for (const [key, count] of tally) {
    const status = key.split(' ').at(-1) ?? ''
    byStatus.set(status, (byStatus.get(status) ?? 0) + count)
  }
  const states = await select<{ state: string; count: string }>('SELECT state, count(*) AS count FROM claims GROUP BY state ORDER BY state')
  const acts = await select<{ act: string; count: string }>(`SELECT act, count(*) AS count FROM audit_entries GROUP BY act ORDER BY count(*) DESC, act`)
  const [mails] = await select<{ count: string }>('SELECT count(*) AS count FROM outbox')
  const list = (rows: Iterable<[string, number | string]>) => [...rows].map(([name, count]) => `${name} ${count}`).join(', ')
  return [
    `${people.length} people, ${requests} requests in ${seconds.toFixed(0)} s (${(requests / seconds).toFixed(0)} a second)`,
    `by status (0: cut off): ${list([...byStatus].sort())}`,
    `claims: ${list(states.map(({ state, count }) => [state, count]))}`,
    `audit trail: ${list(acts.map(({ act, count }) => [act, count]))}`,
    `mails in the outbox: ${mails?.count ?? 0}`,
  ].join('\n')
}
