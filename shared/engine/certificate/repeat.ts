import { computeAll, prepare } from '../engine.ts'
import { EngineRefusal } from '../errors.ts'
import type { Json, Outcome } from '../methods/computation.ts'
import { canonicalDefinition } from '../sets/canonical.ts'
import { canonicalJson } from './canonical-json.ts'
import { type Certificate, isIntact } from './certificate.ts'

/** What came of repeating a certificate from its definition and parameters alone. */
export interface Repetition {
  /** The digest matches the content: nothing was changed since it was made. */
  intact: boolean
  /** Every compared part came out the same to the last character. */
  repeats: boolean
  /** What is not as it should be, each in one sentence. */
  findings: string[]
  /** The outcome of the repetition; null where the certificate cannot be run. */
  outcome: Outcome | null
}

/** The parameters as the engine reads them: one that it does not know, or writes otherwise, is certified by nobody. */
const COMPARED = ['parameters', 'enclosure', 'radius', 'digits', 'budget', 'estimates'] as const

/** Computes the certificate's enclosure again, here, and compares. Needs nothing but the certificate. */
export async function repeatCertificate(certificate: Certificate, onProgress?: (share: number) => void): Promise<Repetition> {
  const intact = await isIntact(certificate)
  const findings = intact ? [] : ['The content does not match its digest: the file was changed after it was made.']
  const outcome = await recompute(certificate, findings, onProgress)
  if (outcome) {
    for (const part of COMPARED) {
      const [stated, found] = [canonicalJson(certificate[part] as unknown as Json), canonicalJson(outcome[part] as unknown as Json)]
      if (stated !== found) findings.push(difference(part, stated, found))
    }
  }
  return { intact, repeats: outcome !== null && findings.length === (intact ? 0 : 1), findings, outcome }
}

function difference(part: (typeof COMPARED)[number], stated: string, found: string): string {
  if (part === 'parameters') return 'The parameters are not written as the engine writes them, or name what it does not know.'
  if (part === 'budget' || part === 'estimates') return `The ${part} comes out differently.`
  return `The ${part} is stated as ${stated} and comes out as ${found}.`
}

async function recompute(certificate: Certificate, findings: string[], onProgress?: (share: number) => void): Promise<Outcome | null> {
  const { definition, method, arithmetic, goal, parameters } = certificate
  try {
    const canonical = canonicalDefinition(definition)
    if (canonicalJson(canonical as unknown as Json) !== canonicalJson(definition as unknown as Json)) {
      findings.push('The definition is not in its canonical form.')
      return null
    }
    const computation = await prepare({ definitions: [definition], method, arithmetic, goal, parameters })
    const [outcome] = await computeAll(computation, onProgress)
    return outcome
  } catch (error) {
    // A RangeError comes from intervals too wide to go on with, which only parameters nobody would choose bring about.
    if (!(error instanceof EngineRefusal || error instanceof RangeError)) throw error
    findings.push(`The engine cannot run it: ${error.message}`)
    return null
  }
}
