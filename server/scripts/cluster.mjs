import { chmodSync, chownSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { join } from 'node:path'
import { runBinary, serverUser } from './postgres-binaries.mjs'
import { startOfProcess } from './process-id.mjs'
import { SetupError } from './say.mjs'

/**
 * A PostgreSQL cluster of our own in a folder: `data` (the server's), `server.log`, and the superuser's password in `password`.
 * It listens on loopback only, has no Unix socket, and asks for passwords (SCRAM).
 */

/** A TCP port of loopback that is free at the moment. @returns {Promise<number>} */
export function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.on('error', reject)
    probe.listen(0, '127.0.0.1', () => {
      const { port } = /** @type {import('node:net').AddressInfo} */ (probe.address())
      probe.close(() => resolve(port))
    })
  })
}

/**
 * Whether a port can be listened on.
 * @param {number} port
 * @param {string} [host]
 * @returns {Promise<boolean>}
 */
export function isFree(port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const probe = createServer()
    probe.on('error', () => resolve(false))
    probe.listen(port, host, () => probe.close(() => resolve(true)))
  })
}

/**
 * Makes the files of a cluster in an empty or absent folder.
 * @param {string} folder
 * @param {string} password of the superuser "postgres"
 * @param {{ durable: boolean }} options
 */
export async function initCluster(folder, password, { durable }) {
  mkdirSync(join(folder, 'data'), { recursive: true, mode: 0o700 })
  // The folder itself must be passable for the server's user; what is secret in it is closed by its own mode.
  chmodSync(folder, 0o711)
  giveToServer(join(folder, 'data'))
  const passwordFile = join(folder, 'initdb-password')
  writeFileSync(passwordFile, password, { mode: 0o600 })
  giveToServer(passwordFile)
  const args = (/** @type {string} */ locale) =>
    ['-D', join(folder, 'data'), '-U', 'postgres', '-E', 'UTF8', `--locale=${locale}`, '--auth=scram-sha-256', `--pwfile=${passwordFile}`, ...(durable ? [] : ['--no-sync'])]
  let run = await runBinary('initdb', args('C.UTF-8'))
  // Systems other than Debian may lack this locale; plain C orders text the same way.
  if (run.status !== 0 && /locale/.test(run.errors)) run = await runBinary('initdb', args('C'))
  rmSync(passwordFile)
  if (run.status !== 0) throw new SetupError(`PostgreSQL's initdb failed: ${run.errors}`)
}

/** @param {string} path */
function giveToServer(path) {
  const user = serverUser()
  if (user) chownSync(path, user.uid, user.gid)
}

/** @param {string} folder */
const pidFile = (folder) => join(folder, 'data', 'postmaster.pid')

/**
 * The port of the server that runs on this folder, or undefined. What a killed server left behind is cleared away: PostgreSQL
 * itself takes a zombie, or a stranger with the same process number, for its living server and would not start.
 * @param {string} folder
 * @returns {number | undefined}
 */
export function runningPort(folder) {
  if (!existsSync(pidFile(folder))) return undefined
  const [pid, , , port] = readFileSync(pidFile(folder), 'utf8').split('\n')
  if (startOfProcess(Number(pid)) !== undefined && isServerOf(Number(pid), folder)) return Number(port)
  rmSync(pidFile(folder), { force: true })
  return undefined
}

/**
 * @param {number} pid
 * @param {string} folder
 */
function isServerOf(pid, folder) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').includes(join(folder, 'data'))
  } catch {
    return process.platform !== 'linux'
  }
}

const DURABLE = ['fsync=on', 'synchronous_commit=on']
const THROWAWAY = ['fsync=off', 'synchronous_commit=off', 'full_page_writes=off', 'max_connections=300']

/**
 * Starts the server unless it runs, on `preferred` if that port is free and on another otherwise. Answers the port.
 * @param {string} folder
 * @param {{ preferred?: number, durable: boolean }} options
 */
export async function startCluster(folder, { preferred, durable }) {
  const running = runningPort(folder)
  if (running !== undefined) return running
  const log = join(folder, 'server.log')
  writeFileSync(log, '', { flag: 'a', mode: 0o600 })
  giveToServer(log)
  // Another program may take the port between the look and the start; then there is another try with another port.
  for (let attempt = 1; ; attempt += 1) {
    const port = attempt === 1 && preferred !== undefined && (await isFree(preferred)) ? preferred : await freePort()
    const settings = ['listen_addresses=127.0.0.1', `port=${port}`, 'unix_socket_directories=', 'log_min_messages=warning', ...(durable ? DURABLE : THROWAWAY)]
    const options = settings.map((setting) => `-c ${setting}`).join(' ')
    const run = await runBinary('pg_ctl', ['start', '-w', '-t', '60', '-D', join(folder, 'data'), '-l', log, '-o', options])
    if (run.status === 0) return port
    if (attempt === 3) throw new SetupError(`The database server does not start. Its log: ${log}\n${tail(log)}`)
  }
}

/** @param {string} file */
const tail = (file) => readFileSync(file, 'utf8').trimEnd().split('\n').slice(-5).join('\n')

/**
 * Stops the server, if it runs. "fast" ends its connections and keeps every commit; "immediate" is for what is thrown away.
 * @param {string} folder
 * @param {'fast' | 'immediate'} mode
 */
export async function stopCluster(folder, mode) {
  if (runningPort(folder) === undefined) return
  await runBinary('pg_ctl', ['stop', '-w', '-t', '30', '-m', mode, '-D', join(folder, 'data')])
}
