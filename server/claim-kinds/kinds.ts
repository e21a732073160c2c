import type { z } from 'zod'
import type { claimInput } from '../../shared/schemas/claim.ts'
import type { ClaimKind } from './claim-kind.ts'
import { enclosure } from './enclosure.ts'
import { order } from './order.ts'
import { stated } from './stated.ts'

type Input = z.output<typeof claimInput>
type KindName = Input['kind']

const KINDS: { [Name in KindName]: ClaimKind<Extract<Input, { kind: Name }>> } = { enclosure, stated, order }

/** The kind of a new claim; its input is of that very kind. */
export function kindOfInput<Name extends KindName>(input: Extract<Input, { kind: Name }>): ClaimKind<Extract<Input, { kind: Name }>> {
  return KINDS[input.kind as Name]
}

/** The kind of a claim that exists. */
export function kindOf(claim: { kind: string }): Omit<ClaimKind<never>, 'content'> {
  const kind = KINDS[claim.kind as KindName]
  if (kind === undefined) throw new RangeError(`there is no kind of claim called ${claim.kind}`)
  return kind
}
