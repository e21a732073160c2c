import { EventEmitter } from 'node:events'
import { setTimeout as pause } from 'node:timers/promises'
import pg from 'pg'
import { env } from '../env.ts'
import { log } from '../log.ts'

/**
 * Tells this process of changes of runs, whichever process makes them: one connection to the database that listens for as long as
 * somebody follows a run. After the connection was lost everybody is told, since something may have been missed.
 */
class RunFeed {
  private readonly changes = new EventEmitter().setMaxListeners(0)
  private client: pg.Client | null = null
  private connecting = false

  /** Calls `told` after each change of the run, until the answered function is called. */
  follow(runId: string, told: () => void): () => void {
    this.changes.on(runId, told)
    void this.connect()
    return () => {
      this.changes.off(runId, told)
      if (this.changes.eventNames().length === 0) void this.disconnect()
    }
  }

  private async connect(): Promise<void> {
    if (this.client || this.connecting) return
    this.connecting = true
    for (let wait = 200; this.changes.eventNames().length > 0; wait = Math.min(2 * wait, 5_000)) {
      const client = new pg.Client({ connectionString: env.DATABASE_URL, application_name: 'merestone-feed', keepAlive: true })
      client.on('error', (error) => log.warn({ err: error }, 'run feed'))
      client.on('notification', ({ payload }) => this.changes.emit(payload ?? ''))
      try {
        await client.connect()
        await client.query('LISTEN run_change')
        client.on('end', () => this.lost(client))
        this.client = client
        break
      } catch (error) {
        log.warn({ err: error }, 'run feed')
        await client.end().catch(() => undefined)
        await pause(wait)
      }
    }
    this.connecting = false
    for (const runId of this.changes.eventNames()) this.changes.emit(runId)
  }

  private lost(client: pg.Client): void {
    if (this.client !== client) return
    this.client = null
    if (this.changes.eventNames().length > 0) void this.connect()
  }

  private async disconnect(): Promise<void> {
    const client = this.client
    this.client = null
    await client?.end().catch(() => undefined)
  }
}

export const runFeed = new RunFeed()
