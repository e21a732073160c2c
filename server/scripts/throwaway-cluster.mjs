import { chmodSync, mkdtempSync, readdirSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { initCluster, startCluster, stopCluster } from './cluster.mjs'
import { addresses, createDatabase, newPasswords } from './database.mjs'
import { startOfProcess } from './process-id.mjs'

const PREFIX = 'merestone-test-'

/** A cluster in a temporary folder for one run of the tests, with no regard for power cuts. */
export async function startThrowawayCluster() {
  await sweep()
  const folder = mkdtempSync(join(tmpdir(), `${PREFIX}${process.pid}-`))
  chmodSync(folder, 0o711)
  const passwords = newPasswords()
  await initCluster(folder, passwords.superuser, { durable: false })
  const port = await startCluster(folder, { durable: false })
  await createDatabase(addresses(port, passwords).superuser, passwords)
  return {
    /** @param {string} [database] */
    urls: (database) => addresses(port, passwords, database),
    stop: async () => {
      await stopCluster(folder, 'immediate')
      rmSync(folder, { recursive: true, force: true })
    },
  }
}

/** Clears away the clusters of runs that were killed before they could. */
async function sweep() {
  for (const name of readdirSync(tmpdir())) {
    const pid = name.startsWith(PREFIX) ? Number(name.slice(PREFIX.length).split('-')[0]) : Number.NaN
    if (Number.isNaN(pid) || startOfProcess(pid) !== undefined) continue
    const folder = join(tmpdir(), name)
    try {
      await stopCluster(folder, 'immediate')
      rmSync(folder, { recursive: true, force: true })
    } catch {
      // Another user's; it is not ours to clear away.
    }
  }
}
