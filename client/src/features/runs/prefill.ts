import type { Definition } from '../../../../shared/engine/sets/definition.ts'
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
      expression: `(${polynomial(definition.numerator)})/(${polynomial(definition.denominator)})`,
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

/** A polynomial in p from its coefficients in ascending powers, as it is typed: "p^2 - p". */
function polynomial(coefficients: string[]): string {
  const terms = coefficients.flatMap((coefficient, power) => (coefficient === '0' ? [] : [{ coefficient, power }])).reverse()
  if (terms.length === 0) return '0'
  return terms
    .map(({ coefficient, power }, index) => {
      const negative = coefficient.startsWith('-')
      const size = coefficient.replace('-', '')
      const variable = power === 0 ? '' : power === 1 ? 'p' : `p^${power}`
      const factor = size === '1' && variable !== '' ? variable : variable === '' ? size : `${size}*${variable}`
      const sign = negative ? (index === 0 ? '-' : ' - ') : index === 0 ? '' : ' + '
      return sign + factor
    })
    .join('')
}
