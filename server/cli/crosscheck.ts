import { METHODS, computeAll, prepare } from '../../shared/engine/engine.ts'
import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { compare } from '../../shared/engine/arithmetic/rational.ts'
import type { ArithmeticName, Method, Outcome } from '../../shared/engine/methods/computation.ts'
import { type Goal, goalText } from '../../shared/engine/methods/goal.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { readDefinition } from '../../shared/engine/sets/typeset.ts'
import { crosscheckGrid } from './crosscheck-grid.ts'

/** One way of computing a constant. */
export interface Way {
  method: Method
  arithmetic: ArithmeticName
  goal: Goal
}

export interface Crossing {
  definition: Definition
  outcomes: { way: Way; outcome: Outcome }[]
  /** Pairs of outcomes that have no number in common: there must be none. */
  disjoint: [Way, Way][]
}

/** Every method that can, in both arithmetics and at two goals (the slower arithmetic at the smaller one), so that no two runs share all parameters. */
function waysOf(definition: Definition): Way[] {
  const ways: Way[] = []
  for (const method of Object.values(METHODS)) {
    const goals: Goal[] = method.name === 'partial-sum' ? [{ cutoff: '20000' }, { cutoff: '200000' }] : [{ digits: 12 }, { digits: 25 }]
    for (const arithmetic of ['ball', 'mpfr'] as const) {
      for (const goal of arithmetic === 'ball' ? goals : goals.slice(0, 1)) {
        const forecast = method.forecast(definition, goal, arithmetic, 1)
        if (forecast.possible && forecast.seconds < 5) ways.push({ method: method.name, arithmetic, goal })
      }
    }
  }
  return ways
}

export function meet(a: Outcome, b: Outcome): boolean {
  const [aLo, aHi, bLo, bHi] = [a.enclosure.lo, a.enclosure.hi, b.enclosure.lo, b.enclosure.hi].map((text) => parseDecimal(text)!)
  return compare(aLo, bHi) <= 0 && compare(bLo, aHi) <= 0
}

/** Computes one constant in every way there is and compares all pairs. */
export async function crosscheck(definition: Definition): Promise<Crossing> {
  const outcomes: Crossing['outcomes'] = []
  for (const way of waysOf(definition)) {
    const [outcome] = await computeAll(await prepare({ definitions: [definition], ...way }))
    outcomes.push({ way, outcome })
  }
  const disjoint = outcomes.flatMap((one, i) => outcomes.slice(0, i).filter((other) => !meet(one.outcome, other.outcome)).map((other): [Way, Way] => [other.way, one.way]))
  return { definition, outcomes, disjoint }
}

function wayText({ method, arithmetic, goal }: Way): string {
  return `${method}, ${arithmetic}, ${goalText(goal)}`
}

/** CPU seconds of this process so far. */
function cpuSeconds(): number {
  const { user, system } = process.cpuUsage()
  return (user + system) / 1e6
}

/** `npm run crosscheck`: the whole grid, or what holds one of the words given; exit code 1 where two enclosures of one constant do not meet. */
async function main(words: string[]): Promise<void> {
  let [constants, pairs, broken] = [0, 0, 0]
  for (const definition of await crosscheckGrid()) {
    const { text } = readDefinition(definition)
    if (words.length > 0 && !words.some((word) => text.includes(word))) continue
    const begun = cpuSeconds()
    const { outcomes, disjoint } = await crosscheck(definition)
    const seconds = `${(cpuSeconds() - begun).toFixed(1)} s`.padStart(7)
    const methods = [...new Set(outcomes.map(({ way }) => way.method))].join(', ')
    console.log(`${disjoint.length === 0 ? 'meet    ' : 'DISJOINT'} ${String(outcomes.length).padStart(2)} enclosures ${seconds}  ${text} (${methods})`)
    for (const [a, b] of disjoint) console.log(`         ${wayText(a)}  |  ${wayText(b)}`)
    constants += 1
    pairs += (outcomes.length * (outcomes.length - 1)) / 2
    broken += disjoint.length
  }
  const elapsed = process.uptime()
  console.log(`${constants} constants, ${pairs} pairs compared, ${broken} disjoint; ${elapsed.toFixed(0)} s elapsed, ${cpuSeconds().toFixed(0)} s of CPU`)
  process.exitCode = broken === 0 ? 0 : 1
}

if (process.argv[1]?.replace(/\.[jt]s$/, '').endsWith('cli/crosscheck')) await main(process.argv.slice(2))
