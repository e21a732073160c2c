import { chmodSync, existsSync, linkSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, isAbsolute, join } from 'node:path'
import { env } from './env.ts'
import { projectRoot } from './project-root.ts'

/** A path in the folder for what is kept outside the database. */
export function dataPath(...parts: string[]): string {
  return join(isAbsolute(env.DATA_DIR) ? env.DATA_DIR : join(projectRoot, env.DATA_DIR), ...parts)
}

/**
 * The content of a secret file, which is made at the first call on this installation. Web and worker may ask at once: the file
 * appears whole (a link to a written one), so both get the same.
 */
export function secretFile(path: string, make: () => string): string {
  if (!existsSync(path)) {
    mkdirSync(dirname(path), { recursive: true, mode: 0o700 })
    const draft = `${path}.${process.pid}`
    writeFileSync(draft, make(), { mode: 0o600 })
    try {
      linkSync(draft, path)
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
    } finally {
      rmSync(draft, { force: true })
    }
  }
  chmodSync(path, 0o600)
  return readFileSync(path, 'utf8')
}
