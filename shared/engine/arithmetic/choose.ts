import type { ArithmeticName } from '../methods/computation.ts'
import type { Arithmetic } from './arithmetic.ts'
import { createBallArithmetic } from './ball.ts'

/** A number of some arithmetic, where the code must not care which. */
export type AnyNumber = unknown

/** Makes an arithmetic by name. MPFR is loaded only where it is asked for. */
export async function createArithmetic(name: ArithmeticName, precision: number): Promise<Arithmetic<AnyNumber>> {
  if (name === 'ball') return createBallArithmetic(precision) as Arithmetic<AnyNumber>
  const { createMpfrArithmetic } = await import('./mpfr.ts')
  return (await createMpfrArithmetic(precision)) as Arithmetic<AnyNumber>
}
