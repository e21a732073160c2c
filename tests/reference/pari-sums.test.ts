import { describe, expect, it } from 'vitest'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import { parseRational } from '../../shared/engine/arithmetic/rational.ts'
import { dirichletSeries } from '../../shared/engine/series/families.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { readDefinition } from '../../shared/engine/sets/typeset.ts'
import { contains } from '../support/enclosures.ts'
import { gp } from '../support/pari.ts'
import { Random } from '../support/random.ts'

const random = new Random()
const DIGITS = 16
const COUNT = 20

/**
 * The sums again by PARI/GP: D(s) from its own zeta and from a longer list of primes, the integral over t by its own intnum, which
 * is double exponential in t and no trapezoid in log t. It gives no bound; agreement to 13 digits is what is asked of it.
 */
const PROGRAM = `
default(realprecision, 28);
lz(s0, t, r) = { if(r == 1 && s0 == 1 && t < 1e-14, return(Euler * t - log(t))); my(s = r * (s0 + t)); if(s > 90, 0, log(zeta(s))) };
pz(s0, t, j, ex) = { my(r = 0.); for(m = 1, 90 \\ j, if(moebius(m), r += moebius(m) / m * lz(s0, t, m * j))); r - sum(i = 1, #ex, ex[i]^-(j * (s0 + t))) };
q(s0, t, j, ex) = { my(r = 0., s = s0 + t); forprime(p = 2, 200, r += (p^s - 1)^-j); for(i = j, 12, r += binomial(i - 1, j - 1) * (pz(s0, t, i, []) - sum(n = 1, 46, prime(n)^-(i * s)))); r - sum(i = 1, #ex, (ex[i]^s - 1)^-j) };
sym(k, p, e) = { my(h = vector(k + 1)); h[1] = 1; for(n = 1, k, h[n + 1] = sum(j = 1, n, if(e && j % 2 == 0, -1, 1) * p[j] * h[n - j + 1]) / n); h[k + 1] };
tz(s0, t) = if(s0 == 1 && t < 1e-14, 1 + Euler * t, t * zeta(s0 + t));
D(kind, k, y, ex, s0, t) = { my(s = s0 + t);
  if(kind == "almost-primes", return(sym(k, vector(k, j, pz(s0, t, j, ex)), 0)));
  if(kind == "squarefree-almost-primes", return(sym(k, vector(k, j, pz(s0, t, j, ex)), 1)));
  if(kind == "distinct-prime-factors", return(sym(k, vector(k, j, q(s0, t, j, ex)), 1)));
  if(kind == "integers", return(tz(s0, t) / t * prod(i = 1, #ex, 1 - ex[i]^-s) - 1));
  if(kind == "squarefree", return(tz(s0, t) / t / zeta(2 * s) / prod(i = 1, #ex, 1 + ex[i]^-s) - 1));
  1 / prod(n = 2, y, if(isprime(n) && !setsearch(Set(ex), n), 1 - n^-s, 1)) - 1 };
F(kind, k, y, ex, s0, b, n) = { my(f = (t) -> t^(b - 1) * D(kind, k, y, ex, s0, t), e = b - 1); if(s0 == 1 && (kind == "integers" || kind == "squarefree"), e = b - 2);
  (intnum(t = if(e == floor(e) && e >= 0, 0, [0, e]), 1, f(t)) + intnum(t = 1, [oo, log(n)], f(t))) / gamma(b) };
`

function randomSet(): SetOfIntegers {
  const exclude = [[], [], [2], [3], [2, 5], [101]][random.whole(0, 5)]
  switch (random.whole(0, 5)) {
    case 0:
      return { kind: 'almost-primes', k: random.whole(1, 5), exclude }
    case 1:
      return { kind: 'squarefree-almost-primes', k: random.whole(1, 4), exclude }
    case 2:
      return { kind: 'distinct-prime-factors', k: random.whole(1, 2), exclude }
    case 3:
      return { kind: 'integers', exclude }
    case 4:
      return { kind: 'squarefree', exclude }
    default:
      return { kind: 'smooth', y: random.whole(5, 40), exclude }
  }
}

function randomDefinition(): { definition: Definition; program: string } {
  const set = randomSet()
  const power = ['1', '1', '3/2', '2'][random.whole(0, 3)]
  const needsMore = power === '1' && (set.kind === 'integers' || set.kind === 'squarefree')
  const logPower = (needsMore ? ['2', '5/2', '3'] : ['1', '1', '1/2', '2', '4/3'])[random.whole(0, needsMore ? 2 : 4)]
  const definition = canonicalDefinition({ type: 'series', set, weight: { power, logPower } })
  // One prime factor is the case k = 1 of the almost primes.
  const kind = set.kind
  const least = dirichletSeries(set, parseRational(power)!)!.leastMember
  const [k, y] = ['k' in set ? set.k : 1, set.kind === 'smooth' ? set.y : 0]
  const excluded = 'exclude' in set ? set.exclude : []
  return { definition, program: `print(F("${kind}", ${k}, ${y}, [${excluded.join(',')}], ${power}, ${logPower}, ${least}))` }
}

describe('twenty definitions at random, held against PARI/GP', () => {
  const chosen = Array.from({ length: COUNT }, randomDefinition)

  it('agree to 13 digits', async () => {
    const printed = gp(PROGRAM + chosen.map(({ program }) => `${program}\n`).join(''))
    expect(printed).toHaveLength(COUNT)
    for (const [i, { definition }] of chosen.entries()) {
      const [outcome] = await computeAll(await prepare({ definitions: [definition], method: 'transform', arithmetic: 'ball', goal: { digits: DIGITS } }))
      // gp writes a small value as 3.7279… E-7: its first figures with the power of ten, or nothing would be compared.
      const [mantissa, exponent = ''] = printed[i].split(' ')
      const value = mantissa.slice(0, mantissa.indexOf('.') + 14) + exponent
      expect(contains(outcome.enclosure, value, 5), `${readDefinition(definition).text}: gp ${printed[i]}, seed ${random.seed}`).toBe(true)
    }
  }, 300_000)
})
