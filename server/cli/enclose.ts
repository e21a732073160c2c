import { readFileSync } from 'node:fs'
import { ONE, parseRational } from '../../shared/engine/arithmetic/rational.ts'
import { makeCertificate } from '../../shared/engine/certificate/certificate.ts'
import { computeAll, prepare, quickestMethod } from '../../shared/engine/engine.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import type { Outcome } from '../../shared/engine/methods/computation.ts'
import { type Goal, serves } from '../../shared/engine/methods/goal.ts'
import { loadExpressionParser } from '../../shared/engine/sets/rational-function.ts'
import { readDefinition } from '../../shared/engine/sets/typeset.ts'
import { readEngineRelease } from '../engine-release.ts'
import { type EncloseOrder, USAGE, readOrder } from './flags.ts'

/** Prints an enclosure. Exit code 0; 2 with one line on standard error where the order makes no sense or the engine refuses. */
async function main(args: string[]): Promise<void> {
  if (args.some((arg) => arg.startsWith('--over-primes'))) await loadExpressionParser()
  const order = readOrder(args, readList)
  if (order === 'help') {
    console.log(USAGE)
    return
  }
  const outcomes = await enclose(order)
  if (!order.json) {
    for (const outcome of outcomes) console.log(personLine(outcome, order.goal))
    return
  }
  const release = readEngineRelease()
  const answers = await Promise.all(outcomes.map(async (outcome) => jsonAnswer(outcome, await makeCertificate(outcome, release))))
  console.log(JSON.stringify(order.table ? answers : answers[0]))
}

function readList(path: string): string {
  try {
    return readFileSync(path, 'utf8')
  } catch (error) {
    throw new EngineRefusal('bad_flag', 'file', `The file ${path} cannot be read: ${error instanceof Error ? error.message : String(error)}`)
  }
}

/** One sweep for the whole table, by the method that suits its last line. */
async function enclose({ definitions, goal, method, arithmetic }: EncloseOrder): Promise<Outcome[]> {
  const chosen = method ?? quickestMethod(definitions[definitions.length - 1], goal, arithmetic)
  return computeAll(await prepare({ definitions, method: chosen, arithmetic, goal }), showProgress())
}

/** A line that is written over, for a person who waits; nothing where no person looks. */
function showProgress(): ((share: number) => void) | undefined {
  if (!process.stderr.isTTY) return undefined
  return (share) => process.stderr.write(share < 1 ? `\r${Math.floor(share * 100)} %` : '\r      \r')
}

function personLine(outcome: Outcome, goal: Goal): string {
  const { text } = readDefinition(outcome.definition)
  const { lo, hi } = outcome.enclosure
  const places = outcome.digits.truncated
  const shown = places > 0 ? `${lo.slice(0, lo.indexOf('.') + 1 + places)}…` : 'no digit certified'
  const short = serves(goal, parseRational(outcome.radius) ?? ONE) ? '' : `\n  wider than asked for: the radius is ${outcome.radius}`
  return `${text}\n  ${shown}  (${Math.max(0, places)} decimals certified)\n  in [${lo}, ${hi}]${short}`
}

function jsonAnswer(outcome: Outcome, certificate: object): object {
  const { enclosure, radius, digits, method, arithmetic, budget } = outcome
  return { lo: enclosure.lo, hi: enclosure.hi, radius, digits: digits.truncated, method, arithmetic, budget, certificate }
}

try {
  await main(process.argv.slice(2))
} catch (error) {
  if (!(error instanceof EngineRefusal)) throw error
  console.error(error.message)
  process.exitCode = 2
}
