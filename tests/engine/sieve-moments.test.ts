import { describe, expect, it } from 'vitest'
import { forEachPrime } from '../../shared/engine/sieve/prime-counts.ts'
import type { MomentBlock } from '../../shared/engine/sieve/moments.ts'
import { LONGEST_BLOCK, TIERS, primeMoments } from '../../shared/engine/sieve/prime-moments.ts'
import { RESIDUES } from '../../shared/engine/sieve/wheel.ts'

function collect(lo: number, hi: number, options = {}): { blocks: MomentBlock[]; singles: number[] } {
  const [blocks, singles]: [MomentBlock[], number[]] = [[], []]
  primeMoments(lo, hi, (batch) => {
    blocks.push(...batch.blocks)
    singles.push(...batch.singles[0])
  }, options)
  return { blocks, singles }
}

describe('moments of the primes', () => {
  it('stay below 2^53 in every cell, even if every candidate were a prime (S-2)', () => {
    for (const { cellBytes, order } of TIERS) {
      let largest = 0n
      for (let byte = -cellBytes / 2; byte < cellBytes / 2; byte++) {
        for (const r of RESIDUES) largest += BigInt(Math.abs(15 * byte + (r - 15) / 2)) ** BigInt(order)
      }
      expect(largest < 2n ** 53n).toBe(true)
    }
  })

  it.each([
    [0, 1_000_000], [240_000, 250_000], [3_900_000, 4_000_000], [31_400_000, 31_600_000], [999_900_001, 1_000_100_000],
    [10 ** 12, 10 ** 12 + 50_000],
  ])('are the power sums of the primes in (%i, %i]', (lo, hi) => {
    const { blocks, singles } = collect(lo, hi)
    const bySum = new Map(blocks.map((block) => [block.centre, block.classes[0].map(() => 0n)]))
    const ordered = [...bySum.keys()]
    let at = 0
    const seen: number[] = []
    forEachPrime(lo, hi, (p) => {
      if (p < 30 * TIERS[0].from) return void seen.push(p)
      // A block of n bytes reaches 15 n + 14 below its centre and 15 n - 16 above.
      while (p > blocks[at].centre + blocks[at].reach - 30) at++
      const block = blocks[at]
      expect(Math.abs(p - block.centre)).toBeLessThanOrEqual(block.reach)
      const e = BigInt((p - ordered[at]) / 2)
      bySum.get(block.centre)?.forEach((_, j, sums) => { sums[j] += e ** BigInt(j) })
    })
    expect(singles).toEqual(seen)
    for (const block of blocks) expect(block.classes[0]).toEqual(bySum.get(block.centre))
  })

  it('keep to blocks that are narrow beside their centre', () => {
    for (const { from, cellBytes, ratio } of TIERS) expect(cellBytes * 2 ** ratio).toBe(from)
    for (const { centre, reach } of collect(0, 40_000_000).blocks) expect(reach / centre).toBeLessThan(0.005)
    expect(LONGEST_BLOCK % 256).toBe(0)
  })

  it('of a residue class and its complements add up to those of all primes', () => {
    const count = (options = {}) => collect(0, 3_000_000, options).blocks.reduce((n, block) => n + block.classes[0][0], 0n)
    const parts = [1, 2].map((residue) => count({ residueClass: { modulus: 3, residue } }))
    expect(parts[0] + parts[1]).toBe(count())
  })
})
