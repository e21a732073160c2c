import { execFileSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import { computeAll } from '../../shared/engine/engine.ts'
import { panels } from '../../shared/engine/methods/panels.ts'
import { edgeSeries } from '../../shared/engine/series/edge.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { parseRational } from '../../shared/engine/arithmetic/rational.ts'
import { contains } from '../support/enclosures.ts'

/** PARI/GP (Debian package pari-gp) evaluates a script; its output by lines. It shares no code with the engine and proves nothing. */
function gp(script: string): string[] {
  return execFileSync('gp', ['-q', '--default', 'parisizemax=1G'], { input: script, encoding: 'utf8' }).trim().split('\n')
}

/** The Mellin integral in GP, by its own double-exponential quadrature: D is an expression in s; s0 and b are exact. */
function mellin(D: string, power: string, logPower: string): string {
  return `printf("%.22f\\n", intnum(t = [0, ${logPower}-1], [oo, log(2)], my(s = ${power} + t); t^(${logPower}-1) * (${D})) / gamma(${logPower}));`
}

const PRELUDE = `
default(realprecision, 28);
Z(s) = if(real(s) > 100, 0., sum(m = 1, ceil(95/real(s)) + 1, if(moebius(m), moebius(m)/m * log(zeta(m*s)))));
H(k, p) = { my(h = vector(k + 1)); h[1] = 1; for(n = 1, k, h[n+1] = sum(j = 1, n, p[j]*h[n+1-j])/n); h[k+1] };
E(k, p) = { my(h = vector(k + 1)); h[1] = 1; for(n = 1, k, h[n+1] = sum(j = 1, n, (-1)^(j-1)*p[j]*h[n+1-j])/n); h[k+1] };
`

const none: number[] = []

describe('against PARI/GP', () => {
  const cases: [string, SetOfIntegers, string, string, string][] = [
    ['primes, b = 2', { kind: 'primes', exclude: none }, '1', '2', 'Z(s)'],
    ['primes, s = 3/2, b = 1', { kind: 'primes', exclude: none }, '3/2', '1', 'Z(s)'],
    ['primes but 2 and 7, s = 2, b = 1/2', { kind: 'primes', exclude: [2, 7] }, '2', '1/2', 'Z(s) - 2^-s - 7^-s'],
    ['3-almost primes, s = 2, b = 1', { kind: 'almost-primes', k: 3, exclude: none }, '2', '1', 'H(3, vector(3, j, Z(j*s)))'],
    ['squarefree k = 3, s = 2, b = 1', { kind: 'squarefree-almost-primes', k: 3, exclude: none }, '2', '1', 'E(3, vector(3, j, Z(j*s)))'],
    ['integers, b = 2', { kind: 'integers', exclude: none }, '1', '2', 'zeta(s) - 1'],
    ['integers, s = 5/4, b = 3/2', { kind: 'integers', exclude: none }, '5/4', '3/2', 'zeta(s) - 1'],
    ['squarefree integers, b = 3', { kind: 'squarefree', exclude: none }, '1', '3', 'zeta(s)/zeta(2*s) - 1'],
    ['7-smooth, b = 1', { kind: 'smooth', y: 7, exclude: none }, '1', '1', '1/((1-2^-s)*(1-3^-s)*(1-5^-s)*(1-7^-s)) - 1'],
  ]
  it.each(cases)('%s', async (_name, set, power, logPower, D) => {
    const definition = canonicalDefinition({ type: 'series', set, weight: { power, logPower } })
    const [outcome] = await computeAll(await panels.prepare({ definitions: [definition], method: 'panels', arithmetic: 'ball', goal: { digits: 22 } }))
    // GP is not rigorous: 15 places are taken for right.
    const [printed] = gp(PRELUDE + mellin(D, power, logPower))
    expect(contains(outcome.enclosure, printed.slice(0, printed.indexOf('.') + 16))).toBe(true)
  })
})

describe('the bounds at the edge, on the rim of the ellipse in GP', () => {
  // Points (eps/2)(1 + a cos v) + i (eps/2) sqrt(a^2-1) sin v of the ellipse of P-3, lambda = 31/64.
  const rim = (eps: string): string => `
    eps = ${eps}; a = 1 + 2*(31/64)/eps;
    rim = vector(49, i, my(v = Pi*(i-1)/48); eps/2*(1 + a*cos(v)) + I*eps/2*sqrt(a^2-1)*sin(v));`

  it.each(['1', '1/2', '1/4'])('eps = %s', (eps) => {
    const bounds = (set: SetOfIntegers) => edgeSeries(set)!.partBounds(parseRational(eps)!, parseRational('31/64')!, createBallArithmetic(64)).map(({ num, den }) => Number(num) / Number(den))
    // GP's log of a product of values is continued along the rim from the real end, where it is real.
    const script = `default(realprecision, 19); ${rim(eps)}
      LZ(t) = if(real(t) > 1/2, log(t) + log(zeta(1+t)), log(t*zeta(1+t)));
      P1(t) = LZ(t) - log(eps) + sum(m = 2, 30, if(moebius(m), moebius(m)/m*log(zeta(m*(1+t)))));
      PJ(j, t) = sum(m = 1, 30, if(moebius(m), moebius(m)/m*log(zeta(j*m*(1+t)))));
      R(t, K, sg) = { my(p = vector(K, j, if(j == 1, P1(t), PJ(j, t))), h = vector(K + 1)); h[1] = 1; for(n = 1, K, h[n+1] = sum(j = 1, n, sg^(j-1)*p[j]*h[n+1-j])/n); h };
      printf("%.9f\\n", vecmax(apply(t -> abs(LZ(t)), rim)));
      all = vector(49, i, R(rim[i], 5, 1)); ele = vector(49, i, R(rim[i], 5, -1));
      for(c = 1, 6, printf("%.9f %.9f\\n", vecmax(vector(49, i, abs(all[i][c]))), vecmax(vector(49, i, abs(ele[i][c])))));
      printf("%.9f\\n", vecmax(apply(t -> abs(t*zeta(1+t) - t), rim)));
      printf("%.9f\\n", vecmax(apply(t -> abs(t*zeta(1+t)/zeta(2+2*t) - t), rim)));`
    const [logZeta, ...rest] = gp(script)
    expect(Number(logZeta)).toBeLessThan(3.3)
    const [complete, elementary] = [bounds({ kind: 'almost-primes', k: 5, exclude: none }), bounds({ kind: 'squarefree-almost-primes', k: 5, exclude: none })]
    for (let c = 0; c <= 5; c++) {
      const [h, e] = rest[c].split(' ').map(Number)
      expect(h).toBeLessThanOrEqual(complete[c])
      expect(e).toBeLessThanOrEqual(elementary[c])
    }
    expect(Number(rest[6])).toBeLessThan(bounds({ kind: 'integers', exclude: none })[0])
    expect(Number(rest[7])).toBeLessThan(bounds({ kind: 'squarefree', exclude: none })[0])
  })
})
