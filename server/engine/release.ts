import type { EngineRelease } from '../../shared/engine/certificate/certificate.ts'
import { readEngineRelease } from '../engine-release.ts'

let release: EngineRelease | undefined

/** The release of the engine that computes here, read once: what this process computes belongs to it. */
export function engineRelease(): EngineRelease {
  release ??= readEngineRelease()
  return release
}
