import type { Definition } from '../../../../shared/engine/sets/definition.ts'
import { quotientText } from '../../../../shared/engine/sets/polynomial-text.ts'
import { BLANK_RUN } from './run-form.ts'
import type { RunFormValues } from './run-form.ts'

/** The form filled in for a constant that is already stated. */
export function prefillFrom(definition: Definition): RunFormValues {
  if (definition.type === 'named') return { ...BLANK_RUN, type: 'named', name: definition.name }
  if (definition.type === 'over-primes')
    return {
      ...BLANK_RUN,
      type: 'over-primes',
      combine: definition.combine,
      exclude: definition.exclude.join(', '),
      expression: quotientText(definition.numerator.map(BigInt), definition.denominator.map(BigInt)),
    }
  const { set, weight } = definition
  return {
    ...BLANK_RUN,
    type: 'series',
    set: set.kind,
    power: weight.power,
    logPower: weight.logPower,
    ...('exclude' in set && { exclude: set.exclude.join(', ') }),
    ...('k' in set && { k: String(set.k) }),
    ...('y' in set && { y: String(set.y) }),
    ...('modulus' in set && { modulus: String(set.modulus), residue: String(set.residue) }),
    ...('members' in set && { members: set.members.join(', ') }),
  }
}
