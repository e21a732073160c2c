import { spawn, spawnSync } from 'node:child_process'
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { ensureDebian, findProgram } from './debian.mjs'
import { SetupError } from './say.mjs'

const DEBIAN_FOLDER = '/usr/lib/postgresql'

/** The folder with initdb, pg_ctl and postgres, of the newest version that is installed. */
export function findBinaries() {
  const versions = existsSync(DEBIAN_FOLDER) ? readdirSync(DEBIAN_FOLDER).sort((a, b) => Number(b) - Number(a)) : []
  const folders = versions.map((version) => join(DEBIAN_FOLDER, version, 'bin'))
  const onPath = findProgram('initdb')
  if (onPath !== undefined) folders.push(dirname(onPath))
  const config = findProgram('pg_config')
  if (config !== undefined) folders.push(spawnSync(config, ['--bindir'], { encoding: 'utf8' }).stdout.trim())
  return folders.find((folder) => ['initdb', 'pg_ctl', 'postgres'].every((name) => existsSync(join(folder, name))))
}

/** Sees to it that PostgreSQL's server programs are there, and answers their folder. */
export async function ensureBinaries() {
  await ensureDebian([{ debian: 'postgresql', why: 'the database server', isPresent: () => findBinaries() !== undefined }])
  return /** @type {string} */ (findBinaries())
}

/**
 * Whom the server runs as: PostgreSQL refuses root, so root hands over to the user that Debian's package has made; everybody else
 * runs it as themselves.
 * @returns {{ uid: number, gid: number } | undefined}
 */
export function serverUser() {
  if (process.getuid?.() !== 0) return undefined
  const line = readFileSync('/etc/passwd', 'utf8').split('\n').find((entry) => entry.startsWith('postgres:'))
  if (line === undefined) throw new SetupError('PostgreSQL does not run as root and there is no user "postgres". Run this as an ordinary user.')
  const [, , uid, gid] = line.split(':')
  return { uid: Number(uid), gid: Number(gid) }
}

/**
 * Runs one of PostgreSQL's programs as the server's user. Standard output goes nowhere: a server that it leaves behind would keep
 * a pipe open for ever.
 * @param {string} name
 * @param {string[]} args
 * @returns {Promise<{ status: number | null, errors: string }>}
 */
export function runBinary(name, args) {
  const folder = findBinaries()
  if (folder === undefined) throw new SetupError('PostgreSQL\'s server programs cannot be found.')
  return new Promise((resolve, reject) => {
    const child = spawn(join(folder, name), args, { ...serverUser(), cwd: '/', env: { ...process.env, LC_ALL: 'C' }, stdio: ['ignore', 'ignore', 'pipe'] })
    let errors = ''
    child.stderr.on('data', (chunk) => (errors += chunk))
    child.on('error', reject)
    // 'exit', not 'close': the server inherits standard error and outlives the program.
    child.on('exit', (status) => {
      child.stderr.destroy()
      resolve({ status, errors: errors.trim() })
    })
  })
}
