import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { root } from './say.mjs'

/**
 * What a build was made from: name, size and time of change of every file below the given paths. Told by the file system alone,
 * so it costs milliseconds; a fresh checkout builds once more than it must, which is the safe side.
 * @param {string[]} paths relative to the project
 */
export function stampOf(paths) {
  const hash = createHash('sha256').update(process.version)
  /** @param {string} path */
  const visit = (path) => {
    const stat = statSync(join(root, path), { throwIfNoEntry: false })
    if (stat === undefined) return
    if (!stat.isDirectory()) {
      hash.update(`${path} ${stat.size} ${stat.mtimeMs}\n`)
      return
    }
    for (const name of readdirSync(join(root, path)).sort()) visit(`${path}/${name}`)
  }
  paths.forEach(visit)
  return hash.digest('hex')
}

/** @param {string} file */
export const readStamp = (file) => (existsSync(file) ? readFileSync(file, 'utf8') : undefined)
