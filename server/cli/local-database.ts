import { existsSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { pathToFileURL } from 'node:url'
import { projectRoot } from '../project-root.ts'

type LocalClusterModule = typeof import('../scripts/local-cluster.mjs')

/**
 * For commands that work on the database of this installation: where DATABASE_URL is not set, it is pointed at the private cluster,
 * which is started if it is not running. To be called before anything that reads the settings is imported. Answers a function that
 * leaves the cluster as it was found.
 */
export async function connectToLocalDatabase(): Promise<() => Promise<void>> {
  const addressFile = resolve(projectRoot, process.env.DATA_DIR || '.data', 'address')
  if (!process.env.PUBLIC_URL && existsSync(addressFile)) process.env.PUBLIC_URL = readFileSync(addressFile, 'utf8')
  process.env.LOG_LEVEL ??= 'warn'
  if (process.env.DATABASE_URL) return async () => undefined
  if (!existsSync(resolve(projectRoot, process.env.DATA_DIR || '.data', 'postgres', 'data'))) {
    console.error('There is no database here yet: "npm start" makes one; or set DATABASE_URL.')
    process.exit(2)
  }
  // Plain JavaScript that is not part of the build.
  const { startLocalCluster } = (await import(pathToFileURL(join(projectRoot, 'server', 'scripts', 'local-cluster.mjs')).href)) as LocalClusterModule
  const cluster = await startLocalCluster()
  process.env.DATABASE_URL = cluster.urls.application
  process.env.DATABASE_OWNER_URL = cluster.urls.owner
  return cluster.wasRunning ? async () => undefined : cluster.stop
}
