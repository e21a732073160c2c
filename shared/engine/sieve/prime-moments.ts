import { type MomentBlock, type MomentSet, addShifted } from './moments.ts'
import { type SieveOptions, sievePrimes } from './prime-sieve.ts'
import { RESIDUES, WHEEL, WHEEL_PRIMES } from './wheel.ts'

/**
 * How primes are gathered from byte `from` of the sieve on. A cell is as long as its power sums up to `order` surely stay
 * below 2^53 (S-2), so that doubles add them exactly; a block is 2^-ratio of its position long, at least a cell.
 */
interface Tier {
  from: number
  cellBytes: number
  order: number
  ratio: number
}

export const TIERS: readonly Tier[] = [
  { from: 2 ** 9, cellBytes: 4, order: 8, ratio: 7 },
  { from: 2 ** 13, cellBytes: 16, order: 6, ratio: 9 },
  { from: 2 ** 17, cellBytes: 64, order: 5, ratio: 11 },
  { from: 2 ** 20, cellBytes: 256, order: 4, ratio: 12 },
]
export const HIGHEST_ORDER = TIERS[0].order
export const LONGEST_BLOCK = 2 ** 16

/** Primes below this are handed out singly. */
export const BLOCKS_FROM = WHEEL * TIERS[0].from

/** Half steps: primes and centres are odd, so e = (p - centre) / 2 is an integer. Offset of each bit of a word from its first. */
const OFFSETS = Float64Array.from({ length: 32 }, (_, i) => 15 * (i >> 3) + (RESIDUES[i & 7] - 15) / 2)

/** The block that contains a byte: blocks are aligned powers of two, which segments and cells respect. */
function blockAround(byte: number): { tier: Tier; start: number; length: number } {
  let t = TIERS.length - 1
  while (byte < TIERS[t].from) t--
  const tier = TIERS[t]
  let length = tier.cellBytes
  while (length < LONGEST_BLOCK && length * 2 ** (tier.ratio + 1) <= byte) length *= 2
  return { tier, start: byte - (byte % length), length }
}

/**
 * Power sums up to the fourth of the primes in words[from..to), about the middle, into `cell`.
 * *Claim*: exact. *Valid for*: at most 64 words. *Bound*: S-2 (the doubles stay integers below 2^53).
 */
function gatherFour(words: Int32Array, from: number, to: number, cell: Float64Array): void {
  let [m0, m1, m2, m3, m4] = [0, 0, 0, 0, 0]
  let base = -30 * (to - from)
  for (let i = from; i < to; i++) {
    let word = words[i]
    while (word !== 0) {
      const bit = word & -word
      word ^= bit
      const e = base + OFFSETS[31 - Math.clz32(bit)]
      const square = e * e
      m0 += 1
      m1 += e
      m2 += square
      m3 += square * e
      m4 += square * square
    }
    base += 60
  }
  cell[0] = m0
  cell[1] = m1
  cell[2] = m2
  cell[3] = m3
  cell[4] = m4
}

/** As `gatherFour` to any order, for the shorter cells of the lower tiers (S-2). */
function gather(words: Int32Array, from: number, to: number, order: number, cell: Float64Array): void {
  cell.fill(0)
  let base = -30 * (to - from)
  for (let i = from; i < to; i++) {
    for (let word = words[i]; word !== 0; word &= word - 1) {
      const e = base + OFFSETS[31 - Math.clz32(word & -word)]
      let power = 1
      for (let j = 0; j <= order; j++, power *= e) cell[j] += power
    }
    base += 60
  }
}

/** Blocks handed over at a time. heuristic: affects speed only */
const BATCH = 512

/**
 * Hands over, in batches, the primes p with lo < p <= hi: singly below BLOCKS_FROM, as exact moments above.
 * *Claim*: every such prime is in exactly one block or among the singles, and the moments are exact.
 * *Valid for*: as `sievePrimes`. *Bound*: S-1, S-2.
 */
export function primeMoments(lo: number, hi: number, take: (batch: MomentSet) => void, options: SieveOptions = {}): void {
  let blocks: MomentBlock[] = []
  const { residueClass } = options
  let singles: number[] = WHEEL_PRIMES.filter(
    (p) => lo < p && p <= hi && (!residueClass || (p - residueClass.residue) % residueClass.modulus === 0),
  )
  const cell = new Float64Array(HIGHEST_ORDER + 1)
  let current: MomentBlock | undefined

  const handOver = () => {
    if (blocks.length + singles.length > 0) take({ blocks, singles: [singles] })
    blocks = []
    singles = []
  }

  const blockAt = (start: number, length: number, order: number): MomentBlock => {
    const centre = WHEEL * (start + length / 2) + 15
    if (current?.centre !== centre) {
      if (blocks.length >= BATCH) handOver()
      current = { centre, step: 2, reach: 15 * length + 14, classes: [new Array<bigint>(order + 1).fill(0n)] }
      blocks.push(current)
    }
    return current
  }

  sievePrimes(
    lo,
    hi,
    (bytes, firstByte) => {
      const words = new Int32Array(bytes.buffer, bytes.byteOffset, bytes.length / 4)
      let i = 0
      for (; i < bytes.length && firstByte + i < TIERS[0].from; i++) {
        for (let bits = bytes[i]; bits !== 0; bits &= bits - 1) {
          singles.push(WHEEL * (firstByte + i) + RESIDUES[31 - Math.clz32(bits & -bits)])
        }
      }
      while (i < bytes.length) {
        const { tier, start, length } = blockAround(firstByte + i)
        const block = blockAt(start, length, tier.order)
        const end = Math.min(bytes.length, start + length - firstByte)
        for (; i < end; i += tier.cellBytes) {
          const [from, to] = [i / 4, (i + tier.cellBytes) / 4]
          if (tier.order === 4) gatherFour(words, from, to, cell)
          else gather(words, from, to, tier.order, cell)
          if (cell[0] > 0) addShifted(block.classes[0], cell, 15 * (firstByte + i + tier.cellBytes / 2 - start - length / 2))
        }
      }
    },
    options,
  )
  handOver()
}
