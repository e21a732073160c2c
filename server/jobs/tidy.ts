import { forgetOldFailures } from '../auth/throttle.ts'
import { forgetOldSessions } from '../commands/session.ts'
import { change } from '../db.ts'

/** Clears what no longer counts for anything. */
export async function tidy(): Promise<void> {
  await forgetOldFailures()
  await forgetOldSessions()
  // Shards of a run that is done are kept for a day, for those who want to see how it was shared out.
  await change(`DELETE FROM run_shards s USING runs r WHERE r.id = s.run_id AND r.state = 'done' AND r.finished_at < now() - interval '1 day'`)
}
