import { createHash } from 'node:crypto'
import { canonicalJson, type Json } from '../audit/canonical.ts'

/**
 * The file of a claim that no run stands behind: what is asserted, as canonical JSON with its digest, in the manner of a certificate.
 * `digest` covers everything but itself and the signature.
 */
export function makeStatement(assertion: { [key: string]: Json }): { text: string; digest: string } {
  const content = { format: 'merestone-statement', version: 1, ...assertion }
  const digest = createHash('sha256').update(canonicalJson(content)).digest('hex')
  return { text: canonicalJson({ ...content, digest }), digest }
}
