import { beforeAll, describe, expect, it } from 'vitest'
import { type EncloseOrder, readOrder } from '../../server/cli/flags.ts'
import { compare, parseRational, subtract } from '../../shared/engine/arithmetic/rational.ts'
import { METHODS, computeAll, prepare, quickestMethod } from '../../shared/engine/engine.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { METHOD_NAMES } from '../../shared/engine/methods/computation.ts'
import { type Goal, decimalsAsked, parseWidth, serves } from '../../shared/engine/methods/goal.ts'
import { loadExpressionParser } from '../../shared/engine/sets/rational-function.ts'

beforeAll(loadExpressionParser)

function order(...args: string[]): EncloseOrder {
  const read = readOrder(args, () => '6 10 15 21 35')
  if (read === 'help') throw new Error('help was asked for')
  return read
}

function refusalOf(work: () => unknown): EngineRefusal {
  try {
    work()
  } catch (error) {
    if (error instanceof EngineRefusal) return error
    throw error
  }
  throw new Error('nothing was refused')
}

describe('a width as a goal', () => {
  const examples = ['--set primes', '--set almost-primes --k 3 --exclude 2', '--set residue-class --mod 4 --residue 1', '--set smooth --y 11', '--set finite --file list',
    '--set integers --power 3/2', '--set squarefree --power 2 --log-power -1', '--constant mertens', "--over-primes 1/(p^2+1)"]

  it.each(examples)('is met, to the exact difference of both ends, by every method that says it can: %s', async (text) => {
    const { definitions } = order(...text.split(' '))
    let tried = 0
    for (const width of ['0.02', '3e-7', '2.5e-21']) {
      const goal: Goal = { width }
      for (const method of METHOD_NAMES) {
        const forecast = METHODS[method].forecast(definitions[0], goal, 'ball', 1)
        if (!forecast.possible || forecast.seconds > 5 || !serves(goal, parseRational(forecast.radius)!)) continue
        const [{ enclosure }] = await computeAll(await prepare({ definitions, method, arithmetic: 'ball', goal }))
        expect(compare(subtract(parseRational(enclosure.hi)!, parseRational(enclosure.lo)!), parseRational(width)!), `${width} by ${method}`).toBeLessThanOrEqual(0)
        tried += 1
      }
    }
    expect(tried).toBeGreaterThan(2)
  }, 60_000)

  it('asks for the least number of decimals that is enough', () => {
    const decimals = (width: string) => decimalsAsked({ width }, 'It', 1_000)
    expect([decimals('0.5'), decimals('0.1'), decimals('0.099'), decimals('1e-30'), decimals('2.5e-30'), decimals('9.9e-31')]).toEqual([1, 1, 2, 30, 30, 31])
  })

  it('lets the engine choose as digits do', () => {
    const { definitions } = order('--set', 'primes')
    expect(quickestMethod(definitions[0], { width: '1e-40' }, 'ball')).toBe(quickestMethod(definitions[0], { digits: 40 }, 'ball'))
  })

  it.each(['0', '1', '-1e-5', '1e-1001', '1/3', 'narrow', '', '1e5', '0x1'])('refuses %j', (width) => {
    expect(parseWidth(width)).toBeNull()
    expect(refusalOf(() => order('--set', 'primes', '--width', width)).field).toMatch(/width/)
  })

  it('stands alone, and is refused at its own name where it is too narrow', () => {
    expect(refusalOf(() => order('--set', 'primes', '--width', '1e-9', '--digits', '9')).message).toContain('one of --digits, --width and --cutoff')
    expect(refusalOf(() => decimalsAsked({ width: '1e-400' }, 'The trapezoid', 300))).toMatchObject({ field: 'width', message: 'The trapezoid goes up to 300 digits.' })
    expect(METHODS['partial-sum'].forecast(order('--set', 'primes').definitions[0], { width: '1e-40' }, 'ball', 1)).toMatchObject({ possible: false })
  })
})
