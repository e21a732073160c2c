import type { EngineRelease } from '../../shared/engine/certificate/certificate.ts'
import { readEngineRelease } from '../engine-release.ts'

/**
 * The release of the engine that computes here, read when the process starts: what it computes belongs to the sources that it was
 * started with, whatever becomes of the files meanwhile.
 */
export const engineRelease: EngineRelease = readEngineRelease()
