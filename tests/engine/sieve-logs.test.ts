import { describe, expect, it } from 'vitest'
import { radius } from '../../shared/engine/arithmetic/arithmetic.ts'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { primesUpTo } from '../../shared/engine/arithmetic/primes.ts'
import { ONE, ZERO, compare, parseRational, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { BinTable, LOG_BINS_FROM, type LogBins, addToBins } from '../../shared/engine/sieve/log-moments.ts'
import { primeMoments } from '../../shared/engine/sieve/prime-moments.ts'

const arithmetic = createBallArithmetic(128)
const finer = createBallArithmetic(256)

function binsUpTo(x: number): LogBins {
  const bins: LogBins = new Map()
  primeMoments(0, x, (batch) => addToBins(arithmetic, batch, bins))
  return bins
}

describe('primes by their logarithms', () => {
  const upTo400000 = binsUpTo(400_000)
  const logs = primesUpTo(400_000).filter((p) => p > LOG_BINS_FROM).map((p) => finer.log(finer.rational(rational(p))))

  it.each(['1', '1.0000001', '3/2', '2', '5.25', '8'])('give the sum of p^-s, s = %s, that single terms give', (text) => {
    const s = parseRational(text)!
    const table = new BinTable(arithmetic, upTo400000)
    const sum = table.powerSum(arithmetic.rational(s), table.factors(arithmetic.rational(subtract(s, ONE))))
    let exact = finer.rational(ZERO)
    for (const log of logs) exact = finer.add(exact, finer.exp(finer.scale(log, { num: -s.num, den: s.den })))
    expect(compare(arithmetic.lower(sum), finer.lower(exact)) <= 0 && compare(finer.upper(exact), arithmetic.upper(sum)) <= 0).toBe(true)
    expect(compare(radius(arithmetic, sum), parseRational('1e-15')!)).toBe(-1)
  })

  it('hold every prime once, and refuse exponents that their series does not reach', () => {
    const bins = binsUpTo(1_000_000)
    const unit = 2n ** 128n
    const [lo, hi] = [...bins.values()].reduce(([a, b], [[low, high]]) => [a + low, b + high], [0n, 0n])
    // 78498 primes to 10^6, 172 of them below 1024.
    expect(lo <= 78326n * unit && 78326n * unit <= hi && hi - lo < unit / 10n ** 6n).toBe(true)
    const table = new BinTable(arithmetic, bins)
    const nine = arithmetic.rational(rational(9))
    expect(() => table.powerSum(nine, table.inverses)).toThrow(RangeError)
  })
})
