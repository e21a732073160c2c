import type { ArithmeticName, BudgetItem, Enclosure, EstimateUse, Json, Method, Outcome, Parameters } from '../methods/computation.ts'
import type { Goal } from '../methods/goal.ts'
import type { Definition } from '../sets/definition.ts'
import { canonicalJson, sha256Hex } from './canonical-json.ts'

export const CERTIFICATE_FORMAT = 'merestone-certificate'
export const CERTIFICATE_VERSION = 1

/** Which program computed it: the version of the release and the SHA-256 of the engine's sources. */
export interface EngineRelease {
  version: string
  digest: string
}

/** Ed25519 over the UTF-8 bytes of `digest` (64 hexadecimal characters), in base64; made by the installation that signed. */
export interface CertificateSignature {
  algorithm: 'Ed25519'
  keyId: string
  value: string
}

/** All that is needed to repeat an enclosure, and what came out. `digest` covers everything but itself and the signature. */
export interface Certificate {
  format: typeof CERTIFICATE_FORMAT
  version: typeof CERTIFICATE_VERSION
  definition: Definition
  method: Method
  arithmetic: ArithmeticName
  goal: Goal
  parameters: Parameters
  enclosure: Enclosure
  radius: string
  digits: { truncated: number; rounded: number }
  budget: BudgetItem[]
  estimates: EstimateUse[]
  engine: EngineRelease
  digest: string
  signature?: CertificateSignature
}

/** The digest that a certificate with this content has to carry. */
export async function certificateDigest(certificate: Certificate | Omit<Certificate, 'digest' | 'signature'>): Promise<string> {
  const { digest: _digest, signature: _signature, ...content } = certificate as Certificate
  return sha256Hex(canonicalJson(content as unknown as Json))
}

/** The certificate of an outcome, not yet signed. */
export async function makeCertificate(outcome: Outcome, engine: EngineRelease): Promise<Certificate> {
  const content: Omit<Certificate, 'digest' | 'signature'> = {
    format: CERTIFICATE_FORMAT,
    version: CERTIFICATE_VERSION,
    definition: outcome.definition,
    method: outcome.method,
    arithmetic: outcome.arithmetic,
    goal: outcome.goal,
    parameters: outcome.parameters,
    enclosure: outcome.enclosure,
    radius: outcome.radius,
    digits: outcome.digits,
    budget: outcome.budget,
    estimates: outcome.estimates,
    engine,
  }
  return { ...content, digest: await certificateDigest(content) }
}

/** Whether the content is what the digest was made of. */
export async function isIntact(certificate: Certificate): Promise<boolean> {
  return (await certificateDigest(certificate)) === certificate.digest
}
