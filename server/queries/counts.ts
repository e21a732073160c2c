import type { Session } from '../../shared/schemas/session.ts'
import { selectOne } from '../db.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { deskCount } from './desk.ts'

/** What waits for a member, for the numbers in the navigation. */
export async function countsFor(reader: SignedInMember | undefined): Promise<Session['counts']> {
  if (!reader) return { desk: 0, runs: 0 }
  const runs = await selectOne<{ count: string }>(`SELECT count(*) AS count FROM runs WHERE started_by = $id AND state IN ('queued', 'running')`, { id: reader.id })
  return { desk: await deskCount(reader), runs: Number(runs?.count) }
}
