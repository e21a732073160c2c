import { CODES, allFactors, distinctFactors, sieveFactors } from './factor-sieve.ts'
import { type MomentBlock, type MomentSet, shiftRows } from './moments.ts'

/** Which integers are told apart: by their number of prime factors, all, distinct or of squarefree integers only; or not at all. */
export type Classification = 'all-factors' | 'distinct-factors' | 'squarefree-factors' | 'squarefree' | 'none'

/** As many classes as an integer below 2^32 can have prime factors, and the class 0, which holds what is not told apart. */
export const CLASSES = 32
const IGNORED = 255

function classMap(classification: Classification): Uint8Array {
  return Uint8Array.from({ length: CODES }, (_, code) => {
    const [all, distinct] = [allFactors(code), distinctFactors(code)]
    // 1 and what is excluded have the code 0.
    if (code === 0) return IGNORED
    switch (classification) {
      case 'all-factors':
        return all
      case 'distinct-factors':
        return distinct
      case 'squarefree-factors':
        return all === distinct ? all : IGNORED
      case 'squarefree':
        return all === distinct ? 0 : IGNORED
      case 'none':
        return 0
    }
  })
}

/** Integers below this are handed out singly. */
export const FACTOR_BLOCKS_FROM = 2 ** 13
const ORDER = 4
/** Cells are at most this long, blocks at most 2^7 cells: S-7 keeps every double below an integer below 2^53. */
const LONGEST_CELL = 2 ** 10
const LONGEST_BLOCK = 2 ** 17
/** Pairs (a, b), a + b <= ORDER, one column for each: sums over the cells of k^b times the a-th power sum. */
const PAIRS = Array.from({ length: ORDER + 1 }, (_, a) => Array.from({ length: ORDER + 1 - a }, (_, b) => [a, b])).flat()
const COLUMN = Array.from({ length: ORDER + 1 }, (_, a) => Array.from({ length: ORDER + 1 }, (_, b) => PAIRS.findIndex(([i, j]) => i === a && j === b)))
/** heuristic: affects speed only */
const BATCH = 256

/** A block 2^-9 of its position long, at least 16 integers, aligned. */
function blockAround(n: number): { start: number; length: number } {
  let length = 16
  while (length < LONGEST_BLOCK && length * 2 ** 10 <= n) length *= 2
  return { start: n - (n % length), length }
}

/** Exact power sums of one block's classes, in the making. */
class BlockSums {
  readonly start: number
  readonly length: number
  private readonly cellLength: number
  private readonly cell = new Float64Array(CLASSES * (ORDER + 1))
  private readonly sums = new Float64Array(CLASSES * PAIRS.length)

  constructor(start: number, length: number) {
    this.start = start
    this.length = length
    this.cellLength = Math.min(length, LONGEST_CELL)
  }

  /** Takes in the integers from <= n < to, whose codes begin at codes[offset]. */
  add(codes: Uint16Array, offset: number, from: number, to: number, classes: Uint8Array): void {
    for (let n = from; n < to; ) {
      const index = Math.floor((n - this.start) / this.cellLength)
      const end = Math.min(to, this.start + (index + 1) * this.cellLength)
      this.fillCell(codes, offset + n - from, end - n, n - this.start - (index + 0.5) * this.cellLength, classes)
      this.takeCell(2 * index + 1 - this.length / this.cellLength)
      n = end
    }
  }

  /** Power sums of the distance from the middle of the cell, which begins at `first` (S-7: exact). */
  private fillCell(codes: Uint16Array, offset: number, count: number, first: number, classes: Uint8Array): void {
    const { cell } = this
    for (let i = 0; i < count; i++) {
      const c = classes[codes[offset + i]]
      if (c === IGNORED) continue
      const e = first + i
      const square = e * e
      const at = c * (ORDER + 1)
      cell[at] += 1
      cell[at + 1] += e
      cell[at + 2] += square
      cell[at + 3] += square * e
      cell[at + 4] += square * square
    }
  }

  /** Adds k^b times each power sum, k being the cell's distance from the middle of the block in half cells (S-7: exact). */
  private takeCell(k: number): void {
    const { cell, sums } = this
    for (let c = 0; c < CLASSES; c++) {
      const at = c * (ORDER + 1)
      if (cell[at] === 0) continue
      let column = c * PAIRS.length
      for (let a = 0; a <= ORDER; a++) {
        let value = cell[at + a]
        for (let b = 0; a + b <= ORDER; b++, value *= k) sums[column++] += value
        cell[at + a] = 0
      }
    }
  }

  /** (k g + e)^j = sum_a binomial(j, a) (k g)^(j-a) e^a with g half a cell. */
  finish(): MomentBlock {
    const rows = shiftRows(this.cellLength / 2, ORDER)
    const classes = Array.from({ length: CLASSES }, (_, c) => {
      const at = c * PAIRS.length
      if (this.sums[at] === 0) return []
      return rows.map((row, j) => row.reduce((total, factor, a) => total + factor * BigInt(this.sums[at + COLUMN[a][j - a]]), 0n))
    })
    return { centre: this.start + this.length / 2, step: 1, reach: this.length / 2, classes }
  }
}

/**
 * Hands over, in batches, the integers lo < n <= hi by class: singly below FACTOR_BLOCKS_FROM, as exact moments above. Those
 * divisible by an excluded prime, and 1, are left out.
 * *Claim*: every other integer is in exactly one class of one block or among the singles of its class; the moments are exact.
 * *Valid for*: as `sieveFactors`. *Bound*: S-6, S-7.
 */
export function factorMoments(
  lo: number,
  hi: number,
  classification: Classification,
  take: (batch: MomentSet) => void,
  exclude: readonly number[] = [],
): void {
  const classes = classMap(classification)
  let blocks: MomentBlock[] = []
  let singles = Array.from({ length: CLASSES }, (): number[] => [])
  let current: BlockSums | undefined

  const handOver = () => {
    take({ blocks, singles })
    blocks = []
    singles = singles.map(() => [])
  }
  const close = () => {
    if (current) blocks.push(current.finish())
    current = undefined
    if (blocks.length >= BATCH) handOver()
  }

  sieveFactors(
    lo,
    hi,
    (codes, first, count) => {
      let n = first
      for (; n < first + count && n < FACTOR_BLOCKS_FROM; n++) {
        const c = classes[codes[n - first]]
        if (c !== IGNORED) singles[c].push(n)
      }
      while (n < first + count) {
        if (!current || n >= current.start + current.length) {
          close()
          const { start, length } = blockAround(n)
          current = new BlockSums(start, length)
        }
        const end = Math.min(first + count, current.start + current.length)
        current.add(codes, n - first, n, end, classes)
        n = end
      }
    },
    exclude,
  )
  close()
  handOver()
}
