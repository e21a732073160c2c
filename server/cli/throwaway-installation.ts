import { fork, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { projectRoot } from '../project-root.ts'

type Clusters = typeof import('../scripts/throwaway-cluster.mjs')

/** An installation that is thrown away: a database cluster and a data folder of its own, and processes as in production on them. */
export interface ThrowawayInstallation {
  urls: ReturnType<Awaited<ReturnType<Clusters['startThrowawayCluster']>>['urls']>
  /** Starts the web process or the worker, and answers it with the address that it listens on. */
  start: (part: 'web' | 'worker') => Promise<{ child: ChildProcess; address: string }>
  /** Kills what is left running and throws everything away. */
  close: () => Promise<void>
}

/** Ends a process and waits until it is gone. */
export async function end(child: ChildProcess, signal: NodeJS.Signals): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return
  const gone = once(child, 'exit')
  child.kill(signal)
  await gone
}

/**
 * Makes one, migrated, and points the settings of this process and of those that it starts at it. To be called before anything that
 * reads the settings is imported.
 */
export async function makeThrowawayInstallation(settings: Record<string, string> = {}): Promise<ThrowawayInstallation> {
  // Plain JavaScript that is not part of the build.
  const { startThrowawayCluster } = (await import(pathToFileURL(join(projectRoot, 'server', 'scripts', 'throwaway-cluster.mjs')).href)) as Clusters
  const data = mkdtempSync(join(tmpdir(), 'merestone-throwaway-'))
  const cluster = await startThrowawayCluster()
  const urls = cluster.urls()
  // One address asks for all people here.
  Object.assign(process.env, { DATABASE_URL: urls.application, DATABASE_OWNER_URL: urls.owner, DATA_DIR: data, HOST: '127.0.0.1', PORT: '0', RATE_LIMIT: '100000000', LOG_LEVEL: 'error', SMTP_URL: '', NODE_ENV: 'production', ...settings })
  const { migrate } = await import('../migrate.ts')
  await migrate(urls.owner, new URL(urls.application).username)

  const compiled = import.meta.url.endsWith('.js')
  const entry = new URL(compiled ? '../index.js' : '../index.ts', import.meta.url)
  const running: ChildProcess[] = []
  return {
    urls,
    start: async (part) => {
      const child = fork(entry, [part], { execArgv: compiled ? [] : ['--import', 'tsx'], stdio: ['ignore', 'inherit', 'inherit', 'ipc'] })
      running.push(child)
      const [message] = (await Promise.race([once(child, 'message'), once(child, 'exit')])) as [{ address?: string } | number]
      if (typeof message !== 'object') throw new Error(`the ${part} process ended with code ${message}`)
      return { child, address: message.address ?? '' }
    },
    close: async () => {
      await Promise.all(running.map((child) => end(child, 'SIGKILL')))
      const { sequelize } = await import('../db.ts')
      await sequelize.close()
      await cluster.stop()
      rmSync(data, { recursive: true, force: true })
    },
  }
}
