import { EngineRefusal } from '../../shared/engine/errors.ts'
import { invalid, type FieldError } from '../errors.ts'

/** Where each input that the engine names stands in what a person sends: the path that a form marks. */
const PATHS: Record<string, string> = {
  k: 'definition.set.k',
  y: 'definition.set.y',
  modulus: 'definition.set.modulus',
  residue: 'definition.set.residue',
  members: 'definition.set.members',
  kind: 'definition.set.kind',
  power: 'definition.weight.power',
  logPower: 'definition.weight.logPower',
  expression: 'definition.expression',
  combine: 'definition.combine',
  name: 'definition.name',
  digits: 'goal.digits',
  width: 'goal.width',
  cutoff: 'goal.cutoff',
  method: 'method',
  arithmetic: 'arithmetic',
}

/** The refusal as a problem with the field at fault. `overPrimes` tells where the exclusion stands. */
export function refusalFields({ field, message }: EngineRefusal, overPrimes = false): FieldError[] {
  const path = field === 'exclude' ? (overPrimes ? 'definition.exclude' : 'definition.set.exclude') : (PATHS[field] ?? field)
  return [{ path, message }]
}

/** Runs what asks the engine; its refusal becomes a 400 that names the field. */
export function askingEngine<T>(overPrimes: boolean, work: () => T): T {
  try {
    return work()
  } catch (error) {
    if (error instanceof EngineRefusal) throw invalid(refusalFields(error, overPrimes), error.message)
    throw error
  }
}
