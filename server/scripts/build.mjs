import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { join, relative } from 'node:path'
import { pathToFileURL } from 'node:url'
import { gzipSync } from 'node:zlib'
import { withLock } from './lock.mjs'
import { ensurePackages } from './packages.mjs'
import { root, runMain, say, SetupError } from './say.mjs'
import { readStamp, stampOf } from './stamp.mjs'

const dist = join(root, 'dist')

/**
 * @typedef {object} Build
 * @property {string} name folder below dist
 * @property {string} what is told to the person who waits
 * @property {string[]} sources
 * @property {(outDir: string) => string[]} command arguments for node; it writes to outDir, given relative to the project
 * @property {(folder: string) => void} [finish] what is left to do with the result
 */

/** @type {Build} */
const server = {
  name: 'node',
  what: 'Compiling the server',
  sources: ['server', 'shared', 'migrations', 'seeders', 'tsconfig.json', 'node_modules/.merestone-stamp'],
  command: (outDir) => ['server/scripts/compile.mjs', outDir, 'dist/node'],
}

/** @type {Build} */
const client = {
  name: 'client',
  what: 'Building the client',
  sources: ['client', 'shared', 'vite.config.ts', 'node_modules/.merestone-stamp'],
  command: (outDir) => ['node_modules/vite/bin/vite.js', 'build', '--outDir', `../${outDir}`, '--logLevel', 'warn'],
  finish: (folder) => compressFolder(join(folder, 'assets')),
}

const COMPRESSIBLE = /\.(js|css|svg|json|wasm|ttf)$/
const WORTH_BYTES = 1_500

/**
 * Puts a gzip beside each file that gains by it, so that the server need not compress the same bytes again and again.
 * @param {string} folder
 */
function compressFolder(folder) {
  if (!existsSync(folder)) return
  for (const name of readdirSync(folder).filter((file) => COMPRESSIBLE.test(file))) {
    const content = readFileSync(join(folder, name))
    if (content.length >= WORTH_BYTES) writeFileSync(join(folder, `${name}.gz`), gzipSync(content, { level: 9 }))
  }
}

/**
 * Builds beside the place and moves the result there, so that whoever runs from it meanwhile sees the old or the new, and the stamp
 * comes with what it tells of.
 * @param {Build} build
 */
async function ensure({ name, what, sources, command, finish }) {
  const place = join(dist, name)
  const isFresh = () => readStamp(join(place, '.stamp')) === stampOf(sources)
  if (isFresh()) return
  await withLock(join(dist, `${name}.lock`), () => {
    if (isFresh()) return
    const stamp = stampOf(sources)
    removeLeftovers(name)
    const draft = join(dist, `${name}-${process.pid}`)
    const old = join(dist, `${name}-${process.pid}.old`)
    say(`${what} …`)
    const run = spawnSync(process.execPath, command(relative(root, draft)), { cwd: root, stdio: ['ignore', 2, 2], env: { ...process.env, NODE_ENV: 'production' } })
    if (run.status !== 0) {
      rmSync(draft, { recursive: true, force: true })
      throw new SetupError(`${what} failed; the compiler's words are above.`)
    }
    mkdirSync(draft, { recursive: true })
    finish?.(draft)
    writeFileSync(join(draft, '.stamp'), stamp)
    if (existsSync(place)) renameSync(place, old)
    renameSync(draft, place)
    rmSync(old, { recursive: true, force: true })
  })
}

/**
 * Clears away drafts of builds that were killed; whoever builds holds the lock, so none is at work.
 * @param {string} name
 */
function removeLeftovers(name) {
  for (const entry of readdirSync(dist)) if (entry.startsWith(`${name}-`)) rmSync(join(dist, entry), { recursive: true, force: true })
}

/** Compiles server, shared code and migrations to dist/node, unless their sources are unchanged. */
export const ensureServerBuild = () => ensure(server)

/** Builds the client to dist/client, unless its sources are unchanged. */
export const ensureClientBuild = () => ensure(client)

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  await runMain(async () => {
    await ensurePackages()
    await ensureServerBuild()
    await ensureClientBuild()
  })
}
