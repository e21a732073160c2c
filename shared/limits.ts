/** Limits that the engine, the server's input checks and the client's forms share. */
export const LIMITS = {
  /** Most certified digits that a run may ask for. */
  digits: 1_000,
  /** Largest k of k-almost primes and their kin. */
  k: 60,
  /** Most primes in an exclusion, and the largest of them. */
  exclusions: 50,
  excludedPrime: 1_000_000,
  /** Largest cut-off of a partial sum. */
  cutoff: 1_000_000_000_000,
  /** Largest modulus of a residue class. */
  modulus: 100,
  /** Largest y of y-smooth integers. */
  smoothBound: 1_000,
  /** Members of an uploaded list. */
  members: 1_000_000,
  evidenceBytes: 25 * 1024 * 1024,
  evidencePerClaim: 20,
} as const
