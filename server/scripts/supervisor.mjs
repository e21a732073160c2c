import { spawn } from 'node:child_process'
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, renameSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { dataFolder, root, say, SetupError } from './say.mjs'

const LOGS = join(dataFolder, 'logs')
const LOG_BYTES = 10_000_000
const READY_MS = 60_000
const STOP_MS = 15_000
/** A process that lived this long is not in a loop of crashes: the next restart is at once again. */
const SOUND_MS = 60_000
const MOST_WAIT_MS = 30_000

/**
 * @typedef {object} Program
 * @property {string} name
 * @property {string[]} args of node
 * @property {Record<string, string>} env
 */

/** A process that is kept running: when it dies it is started again, sooner or later depending on how often it died. */
export class Supervised {
  /** @type {import('node:child_process').ChildProcess | undefined} */
  #child
  #stopping = false
  #crashes = 0
  /** @type {NodeJS.Timeout | undefined} */
  #restart
  /** @type {Program} */
  #program

  /** @param {Program} program */
  constructor(program) {
    this.#program = program
  }

  get logFile() {
    return join(LOGS, `${this.#program.name}.log`)
  }

  /** Starts it and waits until it says that it is ready. One that does not get so far the first time is not tried again. */
  async start() {
    try {
      return await this.#launch()
    } catch (error) {
      await this.stop()
      throw error
    }
  }

  /** @returns {Promise<string>} the address that the process reports */
  #launch() {
    const { name, args, env } = this.#program
    const log = openLog(this.logFile)
    // A group of its own: Ctrl-C reaches the supervisor only, which then stops its processes in order. It notices our end by the IPC channel.
    const child = spawn(process.execPath, ['--enable-source-maps', ...args], { cwd: root, env: { ...process.env, ...env }, stdio: ['ignore', log, log, 'ipc'], detached: true })
    closeSync(log)
    this.#child = child
    const begun = Date.now()
    let ready = false
    return new Promise((resolve, reject) => {
      const late = setTimeout(() => reject(new SetupError(`The ${name} process does not get ready. ${this.#lastWords()}`)), READY_MS)
      child.on('message', (/** @type {{ ready?: boolean, address?: string }} */ message) => {
        if (!message.ready) return
        ready = true
        clearTimeout(late)
        resolve(message.address ?? '')
      })
      child.on('exit', (code, signal) => {
        clearTimeout(late)
        this.#child = undefined
        if (this.#stopping) return
        if (!ready && this.#crashes === 0) return reject(new SetupError(`The ${name} process ended at once (${signal ?? code}). ${this.#lastWords()}`))
        this.#crashes = Date.now() - begun > SOUND_MS ? 1 : this.#crashes + 1
        const wait = Math.min(250 * 2 ** (this.#crashes - 1), MOST_WAIT_MS)
        say(`The ${name} process ended unexpectedly (${signal ?? code}); starting it again. Its log: ${this.logFile}`)
        this.#restart = setTimeout(() => void this.#launch().catch(() => undefined), wait)
      })
    })
  }

  #lastWords() {
    const lines = readFileSync(this.logFile, 'utf8').trimEnd().split('\n').slice(-12)
    return `The end of its log, ${this.logFile}:\n${lines.join('\n')}`
  }

  /** Asks it to end, and makes it end if it does not. */
  async stop() {
    this.#stopping = true
    clearTimeout(this.#restart)
    const child = this.#child
    if (child === undefined) return
    const ended = new Promise((resolve) => child.once('exit', resolve))
    child.kill('SIGTERM')
    const force = setTimeout(() => child.kill('SIGKILL'), STOP_MS)
    await ended
    clearTimeout(force)
  }
}

/**
 * Opens a log for appending; a large one of earlier starts is set aside first, of which one is kept.
 * @param {string} file
 */
function openLog(file) {
  mkdirSync(LOGS, { recursive: true })
  if (existsSync(file) && statSync(file).size > LOG_BYTES) renameSync(file, `${file}.1`)
  return openSync(file, 'a', 0o600)
}
