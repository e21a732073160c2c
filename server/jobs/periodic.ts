import { setTimeout as pause } from 'node:timers/promises'
import { log } from '../log.ts'

/** Does `work` again and again until `shutdown`, with a pause of `milliseconds` in between; a failure is logged and the next turn comes all the same. */
export async function periodically(name: string, milliseconds: number, work: () => Promise<unknown>, shutdown: AbortSignal): Promise<void> {
  while (!shutdown.aborted) {
    await work().catch((error: unknown) => log.error({ err: error }, `${name} failed`))
    await pause(milliseconds, undefined, { signal: shutdown }).catch(() => undefined)
  }
}
