import { fork } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { freePort, isFree } from './cluster.mjs'
import { startLocalCluster } from './local-cluster.mjs'
import { tryLock, unlock } from './lock.mjs'
import { dataFolder, root, runMain, say, SetupError } from './say.mjs'
import { setUp } from './setup.mjs'
import { Supervised } from './supervisor.mjs'

/*
 * `npm start`: sets up what is missing, starts the database, the web process, the worker and the mail catcher, keeps them running,
 * and stops all of them when it is told to.
 */
const PORT = 4600
const PORTS_TRIED = 100
const DATABASE_WATCH_MS = 2_000
const build = join(root, 'dist', 'node', 'server')
const lock = join(dataFolder, 'start.lock')

/** What is to be stopped, the last first. @type {(() => Promise<unknown>)[]} */
const stops = []
let ending = false

async function stopAll() {
  ending = true
  for (const stop of stops.splice(0).reverse()) await stop()
  unlock(lock)
}

/** @param {string} signal */
function onSignal(signal) {
  if (ending) return
  say(signal === 'SIGINT' ? '\nStopping …' : 'Stopping …')
  stopAll().then(
    () => process.exit(0),
    (error) => {
      say(String(error))
      process.exit(1)
    },
  )
}

/** The port that was asked for, or the first free one from the usual on. */
async function choosePort() {
  const host = process.env.HOST || '127.0.0.1'
  if (process.env.PORT) {
    if (await isFree(Number(process.env.PORT), host)) return Number(process.env.PORT)
    throw new SetupError(`Port ${process.env.PORT} is taken by another program. Stop that, or choose another: PORT=${Number(process.env.PORT) + 1} npm start`)
  }
  for (let port = PORT; port < PORT + PORTS_TRIED; port += 2) {
    if ((await isFree(port, host)) && (await isFree(port + 1))) {
      if (port !== PORT) say(`Port ${PORT} is taken by another program; using ${port}.`)
      return port
    }
  }
  throw new SetupError(`No port from ${PORT} to ${PORT + PORTS_TRIED - 1} is free. Choose one: PORT=8080 npm start`)
}

/** Addresses of the database for the processes: the one that DATABASE_URL names, or that of our own cluster, which is then watched. */
async function openDatabase() {
  if (process.env.DATABASE_URL) return { application: process.env.DATABASE_URL, owner: process.env.DATABASE_OWNER_URL || process.env.DATABASE_URL }
  const cluster = await startLocalCluster()
  const watch = setInterval(() => void cluster.revive().catch((error) => say(String(error.message))), DATABASE_WATCH_MS)
  stops.push(async () => {
    clearInterval(watch)
    await cluster.stop()
  })
  return cluster.urls
}

/**
 * Migrations and the demo's data, in a process of their own that has the owner's rights; the others do not.
 * @param {Record<string, string>} env
 * @returns {Promise<{ applied: string[], seeded: boolean, accounts: { email: string, name: string, roles: string[], group: string }[], password: string, separateRoles: boolean }>}
 */
function prepare(env) {
  return new Promise((resolve, reject) => {
    const child = fork(join(build, 'prepare.js'), { cwd: root, env: { ...process.env, ...env }, stdio: ['ignore', 2, 2, 'ipc'], execArgv: ['--enable-source-maps'], detached: true })
    /** @type {any} */
    let prepared
    child.on('message', (message) => (prepared = message))
    child.on('error', reject)
    child.on('exit', (code) => (code === 0 && prepared ? resolve(prepared) : reject(new SetupError('The database could not be brought up to date; the reason is above.'))))
  })
}

/**
 * @param {string} name
 * @param {string[]} args
 * @param {Record<string, string>} env
 */
async function run(name, args, env) {
  if (ending) return ''
  const supervised = new Supervised({ name, args, env })
  stops.push(() => supervised.stop())
  return supervised.start()
}

/** @param {number} port the web process's; the catcher's reader takes the next if it is free */
async function startCatcher(port) {
  const smtpPort = await freePort()
  const reader = (await isFree(port + 1)) ? port + 1 : await freePort()
  const address = await run('mail', [join(build, 'mail', 'catcher', 'main.js'), join(dataFolder, 'mail'), String(smtpPort), String(reader)], {})
  return { SMTP_URL: `smtp://127.0.0.1:${smtpPort}`, MAIL_READER_URL: address }
}

/** Opens the database and brings it up to date. */
async function openPreparedDatabase() {
  const { application, owner } = await openDatabase()
  const demo = process.env.DEMO ?? (process.env.PUBLIC_URL ? 'off' : 'on')
  const prepared = await prepare({ DATABASE_URL: application, DATABASE_OWNER_URL: owner, DEMO: demo })
  if (prepared.applied.length > 0) say(`Database brought up to date (${prepared.applied.length} migrations).`)
  if (!prepared.separateRoles) say('DATABASE_URL and DATABASE_OWNER_URL name one role: only the trigger guards the audit trail. Give the product a role of its own to have both.')
  return { application, prepared }
}

async function main() {
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, onSignal)
  const holder = tryLock(lock)
  if (holder !== undefined) throw new SetupError(`Merestone is running from this folder already (process ${holder.split(' ')[0]}). Stop that first.`)
  await setUp()
  const port = await choosePort()
  const [{ application, prepared }, mail] = await Promise.all([openPreparedDatabase(), process.env.SMTP_URL ? undefined : startCatcher(port)])
  // The owner's rights stay here.
  const env = { ...mail, DATABASE_URL: application, DATABASE_OWNER_URL: '', PORT: String(port) }
  const [address] = await Promise.all(['web', 'worker'].map((name) => run(name, [join(build, 'index.js'), name], env)))
  writeFileSync(join(dataFolder, 'address'), process.env.PUBLIC_URL || address)
  announce(process.env.PUBLIC_URL || address, mail?.MAIL_READER_URL, prepared)
}

/**
 * @param {string} address
 * @param {string | undefined} reader
 * @param {Awaited<ReturnType<typeof prepare>>} prepared
 */
function announce(address, reader, { accounts, password }) {
  console.log(`\nMerestone is ready: ${address}`)
  if (reader) console.log(`Mail that it sends is caught here: ${reader}`)
  if (accounts.length > 0) {
    console.log(`\nDemo accounts, all with the password "${password}":`)
    const width = Math.max(...accounts.map(({ email }) => email.length))
    for (const { email, name, roles, group } of accounts) console.log(`  ${email.padEnd(width)}  ${name}, ${roles.join(' and ')} (${group})`)
  }
  console.log('\nCtrl-C stops it.')
}

await runMain(async () => {
  try {
    await main()
  } catch (error) {
    if (!ending) await stopAll()
    throw error
  }
})
