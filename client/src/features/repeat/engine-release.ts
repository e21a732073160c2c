import type { EngineRelease } from '../../../../shared/engine/certificate/certificate.ts'

/** Filled in by the build (vite.config.ts). */
declare const __ENGINE_RELEASE__: EngineRelease

/** The release of the engine that runs in this page. */
export const ENGINE_RELEASE: EngineRelease = __ENGINE_RELEASE__
