import { createHash } from 'node:crypto'
import { readFileSync, readdirSync } from 'node:fs'
import { join, relative, sep } from 'node:path'
import type { EngineRelease } from '../shared/engine/certificate/certificate.ts'
import { projectRoot } from './project-root.ts'

/**
 * Version and digest of the engine that computes here. The digest is the SHA-256 of a manifest: for each file
 * shared/engine/**\/*.ts, in the order of their paths, a line "sha256-of-its-bytes  path".
 */
export function readEngineRelease(): EngineRelease {
  const folder = join(projectRoot, 'shared', 'engine')
  const files = readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && entry.name.endsWith('.ts'))
    .map((entry) => relative(projectRoot, join(entry.parentPath, entry.name)).split(sep).join('/'))
    .sort()
  const manifest = files.map((path) => `${sha256(readFileSync(join(projectRoot, path)))}  ${path}\n`).join('')
  const { version } = JSON.parse(readFileSync(join(projectRoot, 'package.json'), 'utf8')) as { version: string }
  return { version, digest: sha256(manifest) }
}

function sha256(content: string | Buffer): string {
  return createHash('sha256').update(content).digest('hex')
}
