import { describe, expect, it } from 'vitest'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { parseRational, rational } from '../../shared/engine/arithmetic/rational.ts'
import { estimatesUsed, thetaEnvelope } from '../../shared/engine/estimates/envelope.ts'
import { type Bound, type Estimate, negated, sum, term, twoSided } from '../../shared/engine/estimates/estimate.ts'
import { ESTIMATES, estimateById } from '../../shared/engine/estimates/library.ts'
import { checkEstimates } from '../../server/cli/estimate-check.ts'

const arithmetic = createBallArithmetic(128)
const weight = { power: rational(1), logPower: rational(1) }
const unconditional = ESTIMATES.filter(({ conditional }) => !conditional)

const numbersOf = (bound: Bound): string[] =>
  bound.form === 'decay'
    ? [bound.coefficient, bound.logPower, bound.base, bound.rate, bound.r]
    : bound.terms.flatMap(({ coefficient, power, logPower }) => [coefficient, power, logPower])

describe('the library of estimates', () => {
  it('has one entry an id, complete, with exact numbers, and says what was checked', () => {
    expect(new Set(ESTIMATES.map(({ id }) => id)).size).toBe(ESTIMATES.length)
    for (const { id, title, statement, statementLatex, validFor, source, checked, conditional, condition, claim } of ESTIMATES) {
      expect(id).toMatch(/^[a-z0-9.-]+$/)
      for (const text of [title, statement, statementLatex, validFor, source]) expect(text.length).toBeGreaterThan(3)
      expect(source).toMatch(/\d{4}/)
      expect(checked).toMatch(/^(Numerically true on both sides of every (prime|jump) up to 10\^8|Begins beyond the reach)/)
      expect(conditional).toBe(condition !== null)
      for (const bound of [claim.lower, claim.upper]) for (const text of bound ? numbersOf(bound) : []) expect(parseRational(text)).not.toBeNull()
      expect(estimateById(id)?.id).toBe(id)
    }
    expect(estimateById('nothing')).toBeUndefined()
  })

  it('is true on both sides of every jump up to 2 * 10^6', () => {
    const results = checkEstimates(2_000_000)
    expect(results.filter(({ violations }) => violations > 0)).toEqual([])
    expect(results.filter(({ looked }) => looked > 0).length).toBeGreaterThan(40)
  })

  it('the check sees a statement that is false, and where: theta near 1423, pi near 113', () => {
    const theta = estimateById('theta-buthe-2018-b')!
    const early: Estimate = { ...theta, claim: { ...theta.claim, from: { x: '1423' } } }
    const quarter: Estimate = {
      ...theta, id: 'pi', claim: { quantity: 'pi', from: { x: '2' }, to: null, upper: sum(term('5/4', '1', '-1')) },
    }
    const results = checkEstimates(10_000, [early, quarter])
    // Before 1427, as the design's table of estimates says; Rosser & Schoenfeld 1962, Corollary 2: only at 113.
    expect(results.map(({ lastViolation }) => lastViolation)).toEqual(['1427-', '113'])
  })

  it('the check sees what is false of one class, and where: the extreme mod 8', () => {
    const sharp = estimateById('theta-class-ramare-rumely-1996-thm-2')!
    const within = (moduli: [number, number], coefficient: string): Estimate => ({
      ...sharp, id: coefficient, claim: { ...sharp.claim, moduli, ...twoSided(sum(term(coefficient, '1/2', '0'))) },
    })
    // A separate program in C, fed by primesieve, finds the largest quotient by sqrt(x) mod 8 up to 10^10 just before 11257: 1.817556.
    const results = checkEstimates(20_000, [within([8, 8], '1.817555'), within([8, 8], '1.817557')])
    expect(results.map(({ violations, lastViolation }) => [violations, lastViolation])).toEqual([[1, '11257-'], [0, null]])
  })

  it('turns a bound into its negative', () => {
    expect(negated(sum(term('1.5', '1', '0'), term('-2', '0', '0')))).toEqual(sum(term('-1.5', '1', '0'), term('2', '0', '0')))
    expect(twoSided({ form: 'decay', coefficient: '3', logPower: '1', base: '1', rate: '1', r: '1' }).lower).toMatchObject({ coefficient: '-3' })
  })
})

describe('the envelope of theta', () => {
  it('covers the half-line with estimates inside their ranges', () => {
    const envelope = thetaEnvelope(arithmetic, 1e9, unconditional, weight)!
    for (const side of [envelope.lower, envelope.upper]) {
      expect(side[0].from.key).toBe('x = 1000000000')
      expect(side.at(-1)!.to).toBeNull()
      side.slice(1).forEach((piece, i) => expect(piece.from.key).toBe(side[i].to!.key))
    }
    // Section 6 of the design's table: Büthe to 10^19, partial verification of the Riemann hypothesis to 1.1e26, then Table 15.
    expect(envelope.lower.map(({ estimate }) => estimate.id)).toEqual(['theta-buthe-2018-b', 'theta-johnston-2022', 'theta-bklnw-2021-e55-k1'])
  })

  it('of a class uses what is stated for its modulus, beyond its range what is stated there', () => {
    const ids = (cutoff: number, modulus: number) => thetaEnvelope(arithmetic, cutoff, unconditional, weight, modulus)?.lower.map(({ estimate }) => estimate.id)
    expect(ids(1e6, 4)).toEqual(['theta-class-ramare-rumely-1996-thm-2', 'theta-class-bennett-2018-thm-1.2'])
    expect(ids(1e6, 97)).toBeUndefined()
    expect(ids(8e9, 97)).toEqual(['theta-class-bennett-2018-thm-1.2'])
    expect(estimatesUsed(arithmetic, [1e6], unconditional, [weight], 97).map(({ claim }) => claim.quantity)).not.toContain('theta-class')
  })

  it('is nothing where no estimate reaches', () => {
    expect(thetaEnvelope(arithmetic, 1e9, [estimateById('theta-buthe-2018-b')!], weight)).toBeNull()
    expect(thetaEnvelope(arithmetic, 1000, [estimateById('theta-buthe-2018-b')!, estimateById('theta-dusart-2018-k3-32321')!], weight)).toBeNull()
  })

  it('uses a hypothesis only where it is allowed, and then gains by it', () => {
    const used = estimatesUsed(arithmetic, [1e9], ESTIMATES, [weight])
    expect(used.some(({ id }) => id === 'theta-schoenfeld-1976-rh')).toBe(true)
    expect(estimatesUsed(arithmetic, [1e9], unconditional, [weight]).some(({ conditional }) => conditional)).toBe(false)
    expect(estimatesUsed(arithmetic, [1e9], used, [weight])).toEqual(used)
  })
})
