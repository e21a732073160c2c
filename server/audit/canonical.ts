import { canonicalJson as canonical } from '../../shared/engine/certificate/canonical-json.ts'
import type { Json } from '../../shared/engine/methods/computation.ts'

export type { Json }

/** The canonical JSON of certificates, for anything that can be written as JSON; members that are undefined are left out, as JSON does. */
export function canonicalJson(value: unknown): string {
  return canonical(JSON.parse(JSON.stringify(value)) as Json)
}
