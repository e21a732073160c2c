import { describe, expect, it } from 'vitest'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { Enclosure } from '../../shared/engine/methods/computation.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { contains, sharesDigits } from '../support/enclosures.ts'

function series(set: SetOfIntegers, power = '1', logPower = '1'): Definition {
  return canonicalDefinition({ type: 'series', set, weight: { power, logPower } })
}

async function enclosures(definitions: Definition[], digits: number): Promise<Enclosure[]> {
  const outcomes = await computeAll(await prepare({ definitions, method: 'transform', arithmetic: 'ball', goal: { digits } }))
  return outcomes.map((outcome) => outcome.enclosure)
}

const none: number[] = []
const almostPrimes = (k: number, exclude = none): Definition => series({ kind: 'almost-primes', k, exclude })
const squarefree = (k: number): Definition => series({ kind: 'squarefree-almost-primes', k, exclude: none })

describe('sums of 1/(n log n), printed in the literature', () => {
  it('primes: 1.6366… (Forum Math. Pi 11 (2023) e18, p. 2)', async () => {
    const [primes] = await enclosures([almostPrimes(1)], 10)
    expect(sharesDigits(primes, '1.6366')).toBe(true)
  })

  it('k = 6: 0.98875345…, k = 7: 0.99102059… (J. Number Theory 211 (2020) 513-529, Fig. 2 and 3)', async () => {
    const [six, seven] = await enclosures([almostPrimes(6), almostPrimes(7)], 12)
    expect(sharesDigits(six, '0.98875345')).toBe(true)
    expect(sharesDigits(seven, '0.99102059')).toBe(true)
  })

  it('the sum for k = 6 is the least of all k <= 20 (same paper, Theorem 2.1), and they tend to 1 (Theorem 2.2)', async () => {
    const all = await enclosures(Array.from({ length: 20 }, (_, i) => almostPrimes(i + 1)), 10)
    const six = all[5]
    all.forEach(({ lo }, i) => expect(i === 5 || Number(lo) > Number(six.hi), `k = ${i + 1}`).toBe(true))
    expect(Math.abs(Number(all[19].lo) - 1)).toBeLessThan(2e-5)
  })

  it('the squarefree ones tend to 6/pi^2, the odd ones to 1/2 without ever increasing (C. R. Math. 362 (2024) 1571-1596, Theorem 1.3; J. Number Theory 211, Theorem 2.2)', async () => {
    const ks = Array.from({ length: 12 }, (_, i) => i + 1)
    const odd = await enclosures(ks.map((k) => almostPrimes(k, [2])), 10)
    odd.slice(1).forEach(({ hi }, i) => expect(Number(hi)).toBeLessThan(Number(odd[i].lo)))
    expect(Number(odd[11].lo)).toBeGreaterThan(0.5)
    expect(Number(odd[11].hi)).toBeLessThan(0.5001)
    const [twenty] = await enclosures([squarefree(20)], 10)
    expect(Math.abs(Number(twenty.lo) - 6 / Math.PI ** 2)).toBeLessThan(1e-4)
  })

  it('prime powers: 2.00666645… (R. J. Mathar, arXiv:0811.4739, abstract)', async () => {
    const [powers] = await enclosures([series({ kind: 'distinct-prime-factors', k: 1, exclude: none })], 12)
    expect(sharesDigits(powers, '2.00666645')).toBe(true)
  })
})

/** Computed with Arb 2.23 and, independently, PARI/GP 2.15 (Debian packages): a check against reference libraries. */
const REFERENCE: Record<string, [(k: number) => Definition, string[]]> = {
  all: [
    almostPrimes,
    [
      '1.636616323351260868569658003921863671181597076131293058600304919781339974467946986547004038525584798989',
      '1.144816573405917991524450173893341079131304974017436739119897673173',
      '1.030835101793217571955688899796100390925935',
      '0.997342148595252359777593599548',
      '0.988882192130075534905150182886',
      '0.988753453014509606323117537451',
    ],
  ],
  squarefree: [squarefree, ['1.636616323351260868569658003921', '0.890925479476318332137262621995', '0.713123800509890255412029279069']],
  odd: [(k) => almostPrimes(k, [2]), ['0.915268802906779164889695663420', '0.619685094441076291526849838347', '0.546010010883498718419889654689']],
}

describe('sums of 1/(n log n), from reference libraries', () => {
  it.each(Object.entries(REFERENCE))('%s', async (_name, [definitionOf, printed]) => {
    const found = await enclosures(printed.map((_, i) => definitionOf(i + 1)), 32)
    found.forEach((enclosure, i) => expect(contains(enclosure, printed[i]), `k = ${i + 1}`).toBe(true))
  })

  it('k = 1 and 2 to 66 digits', async () => {
    const found = await enclosures([almostPrimes(1), almostPrimes(2)], 64)
    found.forEach((enclosure, i) => expect(contains(enclosure, REFERENCE.all[1][i]), `k = ${i + 1}`).toBe(true))
  })

  it('other weights: sum 1/(p log^2 p) (PARI/GP, intnum), sum over integers of 1/(n log^2 n), sum 1/(p^2 log p)', async () => {
    expect(sharesDigits((await enclosures([series({ kind: 'primes', exclude: none }, '1', '2')], 20))[0], '1.520970439939500863')).toBe(true)
    expect(sharesDigits((await enclosures([series({ kind: 'integers', exclude: none }, '1', '2')], 15))[0], '2.109742801236')).toBe(true)
    expect(sharesDigits((await enclosures([series({ kind: 'primes', exclude: none }, '2', '1')], 32))[0], '0.507782187859199318774375103794')).toBe(true)
  })
})
