import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { initCluster, runningPort, startCluster, stopCluster } from './cluster.mjs'
import { addresses, createDatabase, newPasswords } from './database.mjs'
import { serverUser } from './postgres-binaries.mjs'
import { dataFolder, say, SetupError } from './say.mjs'

/**
 * The private cluster of this installation: made at the first start, kept, and started and stopped with the product.
 * @typedef {object} LocalCluster
 * @property {{ superuser: string, owner: string, application: string }} urls
 * @property {boolean} wasRunning before it was asked to start
 * @property {() => Promise<void>} revive starts the server again if it has died, on the same port
 * @property {() => Promise<void>} stop
 */

/**
 * @param {string} [data] folder for what the installation keeps
 * @returns {Promise<LocalCluster>}
 */
export async function startLocalCluster(data = dataFolder) {
  const folder = clusterFolder(data)
  if (!existsSync(folder)) await makeCluster(folder)
  const settingsFile = join(folder, 'settings.json')
  if (!existsSync(settingsFile)) throw new SetupError(`${folder} is there, but its settings.json with the passwords is not. Put it back, or move the folder away to begin with an empty database.`)
  const settings = JSON.parse(readFileSync(settingsFile, 'utf8'))
  const wasRunning = runningPort(folder) !== undefined
  const port = await startCluster(folder, { preferred: settings.port, durable: true })
  if (port !== settings.port) writeFileSync(settingsFile, JSON.stringify({ ...settings, port }), { mode: 0o600 })
  return {
    urls: addresses(port, settings.passwords),
    wasRunning,
    revive: async () => {
      if (runningPort(folder) !== undefined) return
      say('The database server has ended; starting it again …')
      const revived = await startCluster(folder, { preferred: port, durable: true })
      if (revived !== port) throw new SetupError(`The database's port ${port} was taken by another program meanwhile. Stop Merestone and start it again.`)
    },
    stop: () => stopCluster(folder, 'fast'),
  }
}

/**
 * Makes the cluster beside its place and moves it there when all is done. So a folder in place is whole, and one beside it is the
 * rest of a broken-off attempt and is done again.
 * @param {string} folder
 */
async function makeCluster(folder) {
  const partial = `${folder}.partial`
  if (existsSync(partial)) {
    say('An earlier start was broken off while it made the database; making it anew …')
    if (runningPort(partial) !== undefined) await stopCluster(partial, 'immediate')
    rmSync(partial, { recursive: true, force: true })
  } else {
    say('Making a private database cluster …')
  }
  const passwords = newPasswords()
  await initCluster(partial, passwords.superuser, { durable: true })
  const port = await startCluster(partial, { durable: true })
  try {
    await createDatabase(addresses(port, passwords).superuser, passwords)
  } finally {
    await stopCluster(partial, 'fast')
  }
  writeFileSync(join(partial, 'settings.json'), JSON.stringify({ port, passwords }), { mode: 0o600 })
  renameSync(partial, folder)
}

/**
 * The cluster's folder: in .data, or, where PostgreSQL's user may not pass through a folder above it (a home of root, say),
 * elsewhere on the machine, which is recorded in .data.
 * @param {string} data
 */
function clusterFolder(data) {
  const locationFile = join(data, 'cluster-location.json')
  mkdirSync(data, { recursive: true })
  const local = join(data, 'postgres')
  if (existsSync(locationFile)) {
    const { beside, folder } = JSON.parse(readFileSync(locationFile, 'utf8'))
    // A copied checkout must not share the database of the one it was copied from.
    if (beside === data) return folder
  }
  if (existsSync(local) || isReachable(data)) return local
  const name = createHash('sha256').update(data).digest('hex').slice(0, 12)
  const elsewhere = ['/var/lib/merestone', join(tmpdir(), 'merestone')].find((parent) => {
    mkdirSync(parent, { recursive: true, mode: 0o711 })
    return isReachable(parent)
  })
  if (elsewhere === undefined) throw new SetupError(`PostgreSQL's user can reach neither ${data} nor /var/lib. Move the project to a folder that other users may pass through.`)
  const folder = join(elsewhere, name)
  say(`PostgreSQL's user cannot reach ${data}; the database is kept in ${folder}.`)
  writeFileSync(locationFile, JSON.stringify({ beside: data, folder }))
  return folder
}

/**
 * Whether the server's user may pass through all folders down to this one.
 * @param {string} folder
 */
function isReachable(folder) {
  const user = serverUser()
  return user === undefined || spawnSync('test', ['-x', folder], { ...user, cwd: '/' }).status === 0
}
