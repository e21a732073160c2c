import { linkSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { isAlive, ownName } from './process-id.mjs'

/**
 * Takes the lock file if nobody alive holds it. It appears whole or not at all (a link to a written file), with its holder's name.
 * The lock of a dead holder is moved aside first: of several that try this at once, only one finds the file to move.
 * @param {string} path
 * @returns {string | undefined} the holder's name if it is held
 */
export function tryLock(path) {
  mkdirSync(dirname(path), { recursive: true })
  const mine = `${path}.${process.pid}`
  writeFileSync(mine, ownName())
  try {
    for (;;) {
      try {
        linkSync(mine, path)
        return undefined
      } catch (error) {
        if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') throw error
      }
      const holder = read(path)
      if (holder !== undefined && isAlive(holder)) return holder
      if (holder !== undefined) removeStale(path, holder)
    }
  } finally {
    rmSync(mine, { force: true })
  }
}

/** @param {string} path */
function read(path) {
  try {
    return readFileSync(path, 'utf8')
  } catch {
    return undefined
  }
}

/**
 * @param {string} path
 * @param {string} holder
 */
function removeStale(path, holder) {
  const aside = `${path}.stale.${process.pid}`
  try {
    renameSync(path, aside)
  } catch {
    return
  }
  // Between reading and moving, another process may have mended the lock and taken it: then it is put back.
  if (read(aside) !== holder) linkSync(aside, path)
  rmSync(aside, { force: true })
}

/** @param {string} path */
export function unlock(path) {
  if (read(path) === ownName()) rmSync(path, { force: true })
}

/**
 * Runs `work` while holding the lock; waits for whoever holds it, and tells so once.
 * @template T
 * @param {string} path
 * @param {() => T | Promise<T>} work
 * @param {(holder: string) => void} [onWait]
 * @returns {Promise<T>}
 */
export async function withLock(path, work, onWait) {
  for (let waited = false; ; waited = true) {
    const holder = tryLock(path)
    if (holder === undefined) break
    if (!waited) onWait?.(holder)
    await pause(200)
  }
  try {
    return await work()
  } finally {
    unlock(path)
  }
}
