import { existsSync } from 'node:fs'
import { dirname, join } from 'node:path'

/** The folder that holds package.json, found from here upwards, so that it is the same for sources and for the build. */
function findRoot(folder: string): string {
  if (existsSync(join(folder, 'package.json'))) return folder
  const parent = dirname(folder)
  if (parent === folder) throw new Error('package.json is not in any folder above the server')
  return findRoot(parent)
}

export const projectRoot: string = findRoot(import.meta.dirname)
