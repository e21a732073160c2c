import { spawnSync } from 'node:child_process'
import { createBallArithmetic } from '../../shared/engine/arithmetic/ball.ts'
import { rational } from '../../shared/engine/arithmetic/rational.ts'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { ComputationRequest } from '../../shared/engine/methods/computation.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { divisibility } from '../../shared/engine/sets/primitive.ts'
import { sumBatch } from '../../shared/engine/sieve/block-sums.ts'
import { factorMoments } from '../../shared/engine/sieve/factor-moments.ts'
import { expandWeight } from '../../shared/engine/sieve/weight.ts'
import { EnginePool } from '../engine/pool.ts'
import { readEngineRelease } from '../engine-release.ts'
import { projectRoot } from '../project-root.ts'

const WEIGHT = { power: '1', logPower: '1' }

interface Row {
  work: string
  /** CPU seconds of this process, or wall seconds of a whole command. */
  seconds: number
  atMost: number
  beside: string
}

function almostPrimes(k: number): Definition {
  return canonicalDefinition({ type: 'series', set: { kind: 'almost-primes', k, exclude: [] }, weight: WEIGHT })
}

const upTo = (k: number): Definition[] => Array.from({ length: k }, (_, i) => almostPrimes(i + 1))

/** CPU seconds of this thread that the work takes. */
async function cpu(work: () => unknown): Promise<number> {
  const before = process.cpuUsage()
  await work()
  const { user, system } = process.cpuUsage(before)
  return (user + system) / 1e6
}

async function enclose(request: Omit<ComputationRequest, 'arithmetic'>): Promise<void> {
  await computeAll(await prepare({ ...request, arithmetic: 'ball' }))
}

/** Wall seconds of a whole command, start-up included. */
function command(args: string[]): number {
  const start = performance.now()
  const run = spawnSync('npm', ['run', '-s', 'enclose', '--', ...args], { cwd: projectRoot, stdio: ['ignore', 'ignore', 'inherit'] })
  if (run.status !== 0) throw new Error(`enclose ${args.join(' ')} ended with code ${run.status}`)
  return (performance.now() - start) / 1000
}

/** Seconds that a program of PARI/GP takes by its own clock; null where it is not installed. */
function gp(program: string): number | null {
  const run = spawnSync('gp', ['-q', '-f', '--default', 'parisizemax=2G'], { input: `${program}\n`, encoding: 'utf8' })
  return run.status === 0 ? Number(run.stdout.trim().split('\n').pop()) / 1000 : null
}

const PARI_TABLE = `default(realprecision, 60);
pz(s) = sum(m = 1, 200 \\ max(1, ceil(s)), if(moebius(m) && m * s < 220, moebius(m) / m * log(zeta(m * s))));
sums(s) = { my(p = vector(10, j, pz(j * s)), h = vector(11)); h[1] = 1; for(n = 1, 10, h[n + 1] = sum(j = 1, n, p[j] * h[n - j + 1]) / n); h[2..11] };
gettime(); intnum(u = -125, 5.2, my(t = exp(u)); t * sums(1 + t)); print(gettime());`
const PARI_PRIMES = `default(realprecision, 38); gettime(); s = 0.; forprime(p = 2, 10^7, s += 1 / (p * log(p))); print(gettime());`

/** Seconds that primesieve takes to count the primes up to 10^9 with one thread; null where it is not installed. */
function primesieve(): number | null {
  const start = performance.now()
  const run = spawnSync('primesieve', ['1e9', '-t1', '-q', '-c'])
  return run.status === 0 ? (performance.now() - start) / 1000 : null
}

/** Wall seconds of a computation whose shards go to that many threads, as the worker has it; the threads are warm. */
async function threaded(threads: number, request: ComputationRequest): Promise<number> {
  const pool = new EnginePool(threads, 1024)
  const whole = async (run: string): Promise<void> => {
    const { value } = await pool.run({ kind: 'prepare', run, request })
    const shards = await Promise.all(value.costs.map((_, index) => pool.run({ kind: 'shard', run, request: { ...request, parameters: value.parameters }, index })))
    await pool.run({ kind: 'combine', run, request: { ...request, parameters: value.parameters }, results: shards.map((shard) => shard.value), release: readEngineRelease() })
  }
  try {
    await Promise.all(Array.from({ length: threads }, () => pool.run({ kind: 'calibrate' })))
    const start = performance.now()
    await whole('bench')
    return (performance.now() - start) / 1000
  } finally {
    await pool.close()
  }
}

function allFactorsTo(n: number): void {
  const arithmetic = createBallArithmetic(96)
  const expansions = [expandWeight({ power: rational(1), logPower: rational(1) }, 8)]
  factorMoments(0, n, 'all-factors', (batch) => void sumBatch(arithmetic, expansions, batch))
}

/** A million distinct integers below 10^9 by a fixed generator. */
function aMillion(): string[] {
  const found = new Set<number>()
  for (let x = 12_345; found.size < 1_000_000; ) {
    x = (x * 48_271) % 2_147_483_647
    const n = 2 + (x % 999_999_998)
    found.add(n)
  }
  return [...found].sort((a, b) => a - b).map(String)
}

const shown = (reference: number | null, name: string, seconds: number, scale = 1): string =>
  reference === null ? `${name} is not installed` : `${name} ${(reference * scale).toFixed(2)} s, ratio ${((reference * scale) / seconds).toFixed(1)}`

/** Wall time by one thread and by two, of each the better of two rounds taken in turn: what else the machine does falls on both. */
async function sideBySide(request: ComputationRequest): Promise<[one: number, two: number]> {
  const rounds = [[await threaded(1, request), await threaded(2, request)], [await threaded(1, request), await threaded(2, request)]] as const
  return [Math.min(rounds[0][0], rounds[1][0]), Math.min(rounds[0][1], rounds[1][1])]
}

async function rows(long: boolean): Promise<Row[]> {
  const primes: SetOfIntegers = { kind: 'primes', exclude: [] }
  const primeSum = canonicalDefinition({ type: 'series', set: primes, weight: WEIGHT })
  const members = aMillion()
  // A short run first, so that what every process makes once is not counted to the first row.
  await enclose({ definitions: [almostPrimes(2)], method: 'panels', goal: { digits: 10 } })

  const table50 = await cpu(() => enclose({ definitions: upTo(10), method: 'panels', goal: { digits: 50 } }))
  const trapezoid50 = await cpu(() => enclose({ definitions: upTo(10), method: 'transform', goal: { digits: 50 } }))
  const table100 = await cpu(() => enclose({ definitions: upTo(20), method: 'panels', goal: { digits: 100 } }))
  const whole30 = command(['--set', 'almost-primes', '--k', '3', '--digits', '30'])
  const whole50 = command(['--set', 'almost-primes', '--k', '1..10', '--digits', '50'])
  const whole100 = command(['--set', 'almost-primes', '--k', '1..20', '--digits', '100'])
  const one200 = await cpu(() => enclose({ definitions: [almostPrimes(1)], method: 'panels', goal: { digits: 200 } }))
  const request200: ComputationRequest = { definitions: [almostPrimes(1)], method: 'panels', arithmetic: 'ball', goal: { digits: 200 } }
  const [oneThread, twoThreads] = await sideBySide(request200)
  const request9: ComputationRequest = { definitions: [primeSum], method: 'partial-sum', arithmetic: 'ball', goal: { cutoff: '4000000000' } }
  const [oneSieve, twoSieve] = await sideBySide(request9)
  const sum9 = await cpu(() => enclose({ definitions: [primeSum], method: 'partial-sum', goal: { cutoff: '1000000000' } }))
  const sum7 = await cpu(() => enclose({ definitions: [primeSum], method: 'partial-sum', goal: { cutoff: '10000000' } }))
  const factors = await cpu(() => allFactorsTo(100_000_000))
  const primitive = await cpu(() => divisibility(members))
  const table: Row[] = [
    { work: 'k = 1..10, 50 digits, panels', seconds: table50, atMost: 1, beside: shown(gp(PARI_TABLE), 'PARI/GP without bounds', table50) },
    { work: 'k = 1..10, 50 digits, trapezoid', seconds: trapezoid50, atMost: 4, beside: '' },
    { work: 'k = 1..20, 100 digits, panels', seconds: table100, atMost: 5, beside: '' },
    { work: 'enclose, one constant, 30 digits (wall)', seconds: whole30, atMost: 2, beside: '' },
    { work: 'enclose, k = 1..10, 50 digits (wall)', seconds: whole50, atMost: 1.6, beside: '' },
    { work: 'enclose, k = 1..20, 100 digits (wall)', seconds: whole100, atMost: 6, beside: '' },
    { work: 'one constant, 200 digits', seconds: one200, atMost: 30, beside: '' },
    { work: 'one constant, 200 digits, two threads (wall)', seconds: twoThreads, atMost: Number((oneThread / 1.7).toFixed(2)), beside: shown(oneThread, 'one thread', twoThreads) },
    { work: 'sum over p <= 4 10^9, two threads (wall)', seconds: twoSieve, atMost: Number((oneSieve / 1.7).toFixed(2)), beside: shown(oneSieve, 'one thread', twoSieve) },
    { work: 'sum over p <= 10^9 with its tail', seconds: sum9, atMost: 3, beside: shown(primesieve(), 'primesieve (counting only)', sum9) },
    { work: 'sum over p <= 10^7 with its tail', seconds: sum7, atMost: 1, beside: shown(gp(PARI_PRIMES), 'PARI/GP forprime without bound', sum7) },
    { work: 'all k at once to 10^8', seconds: factors, atMost: 4, beside: '' },
    { work: 'primitive check of 10^6 integers below 10^9', seconds: primitive, atMost: 5, beside: '' },
  ]
  if (long) table.push({ work: 'one constant, 500 digits', seconds: await cpu(() => enclose({ definitions: [almostPrimes(1)], method: 'panels', goal: { digits: 500 } })), atMost: 1200, beside: '' })
  return table
}

/** `npm run bench`, with `--long` for the rows that take minutes. Exit code 1 where a row takes longer than it may. */
const found = await rows(process.argv.includes('--long'))
console.log('| work | seconds | at most | beside |\n| --- | --- | --- | --- |')
for (const { work, seconds, atMost, beside } of found) console.log(`| ${work} | ${seconds.toFixed(2)} | ${atMost} | ${beside} |`)
console.log(`\nPeak memory ${(process.resourceUsage().maxRSS / 1024).toFixed(0)} MB. Seconds are CPU seconds of one thread where "wall" is not said.`)
process.exitCode = found.every(({ seconds, atMost }) => seconds <= atMost) ? 0 : 1
