import type { Estimate } from './estimate.ts'
import { MERTENS_ESTIMATES } from './mertens.ts'
import { PRIME_COUNT_ESTIMATES } from './prime-count.ts'
import { PSI_ESTIMATES } from './psi.ts'
import { THETA_CLASS_ESTIMATES } from './theta-classes.ts'
import { THETA_ESTIMATES } from './theta.ts'

/** Every estimate that a certificate may cite. Entries are added and explained, never changed under the same id. */
export const ESTIMATES: readonly Estimate[] = [
  ...THETA_ESTIMATES,
  ...THETA_CLASS_ESTIMATES,
  ...PSI_ESTIMATES,
  ...PRIME_COUNT_ESTIMATES,
  ...MERTENS_ESTIMATES,
]

const byId = new Map(ESTIMATES.map((estimate) => [estimate.id, estimate]))

/** The estimate with this id; undefined where there is none. */
export function estimateById(id: string): Estimate | undefined {
  return byId.get(id)
}
