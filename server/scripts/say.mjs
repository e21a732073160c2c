import { resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

/** The project's folder. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '')

/** What this installation keeps: database, keys, logs, caught mail. Never under version control. */
export const dataFolder = resolve(root, process.env.DATA_DIR || '.data')

/**
 * A line for the person at the keyboard. It goes to standard error, so that what a command answers on standard output stays clean.
 * @param {string} line
 */
export function say(line) {
  process.stderr.write(`${line}\n`)
}

/** A failure whose message says all that a person needs; it is shown without a stack. */
export class SetupError extends Error {}

/**
 * Runs a script's main function; a SetupError ends the process with its message and exit code 1.
 * @param {() => Promise<void>} main
 */
export async function runMain(main) {
  try {
    await main()
  } catch (error) {
    if (!(error instanceof SetupError)) throw error
    say(`\n${error.message}`)
    process.exitCode = 1
  }
}
