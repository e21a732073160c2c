import { binomial } from '../arithmetic/integers.ts'

/**
 * Integers near a centre, by their exact power sums: all that a sum of a smooth weight over them needs. They may be told apart
 * in classes; for each class, with e = (n - centre) / step an integer, moments[j] = sum of e^j, empty where the class is.
 */
export interface MomentBlock {
  readonly centre: number
  readonly step: number
  /** |n - centre| <= reach for every integer n of the block. */
  readonly reach: number
  readonly classes: bigint[][]
}

/** Blocks and, where these do not pay, integers one by one: singles[class]. */
export interface MomentSet {
  readonly blocks: MomentBlock[]
  readonly singles: number[][]
}

/** rows[j][a] = binomial(j, a) shift^(j-a): moments about a centre that lies `shift` steps lower, from those about a higher one. */
const shiftMemory = new Map<string, bigint[][]>()

export function shiftRows(shift: number, order: number): bigint[][] {
  const key = `${shift}/${order}`
  let rows = shiftMemory.get(key)
  if (!rows) {
    rows = Array.from({ length: order + 1 }, (_, j) =>
      Array.from({ length: j + 1 }, (_, a) => binomial(j, a) * BigInt(shift) ** BigInt(j - a)),
    )
    shiftMemory.set(key, rows)
  }
  return rows
}

/**
 * Adds to `moments`, about a centre c, the integers with power sums `cell` about c + shift steps.
 * *Claim*: exact, (e + shift)^j = sum_a binomial(j, a) shift^(j-a) e^a. *Valid for*: entries of `cell` that are exact integers.
 */
export function addShifted(moments: bigint[], cell: Float64Array, shift: number): void {
  const rows = shiftRows(shift, moments.length - 1)
  const exact = moments.map((_, a) => BigInt(cell[a]))
  for (let j = 0; j < moments.length; j++) {
    const row = rows[j]
    let total = exact[j]
    for (let a = 0; a < j; a++) total += row[a] * exact[a]
    moments[j] += total
  }
}
