import type { Session } from 'better-sse'
import { log } from '../log.ts'
import { presentRunEvent } from '../presenters/run.ts'
import { runEventOf } from '../queries/run.ts'
import { runFeed } from './run-feed.ts'

/** How long a run may be silent before its row is read anyway: a worker can die without a word. */
const SILENCE_MS = 5_000
/** A follower hears at most this often. */
const PAUSE_MS = 250

/**
 * Tells a client by server-sent events how a run goes: at once how it stands, then each change, and as the last event the state
 * in which it ended. Ends earlier when the client leaves, and when `mayFollow` denies it: who has signed out hears nothing more.
 */
export async function followRun(runId: string, session: Session, mayFollow: () => Promise<boolean>): Promise<void> {
  const gone = new AbortController()
  session.on('disconnected', () => gone.abort())
  let wake: () => void = () => undefined
  const news = { come: false }
  const unfollow = runFeed.follow(runId, () => {
    news.come = true
    wake()
  })
  gone.signal.addEventListener('abort', () => wake())
  const sleep = (milliseconds: number): Promise<void> =>
    new Promise((resolve) => {
      const timer = setTimeout(resolve, milliseconds)
      wake = () => (clearTimeout(timer), resolve())
    })
  try {
    for (let said = ''; !gone.signal.aborted; ) {
      news.come = false
      const row = await runEventOf(runId)
      if (!row || !(await mayFollow())) return
      const event = presentRunEvent(row)
      const text = JSON.stringify(event)
      if (text !== said) session.push(event, 'progress')
      said = text
      if (event.state !== 'queued' && event.state !== 'running') return
      await sleep(PAUSE_MS)
      if (!news.come && !gone.signal.aborted) await sleep(SILENCE_MS)
    }
  } catch (error) {
    // The headers are sent: the stream breaks off and the client comes again.
    log.warn({ err: error, runId }, 'following a run failed')
  } finally {
    unfollow()
  }
}
