import { parseArgs } from 'node:util'
import { isPrime, primeDivisors } from '../../shared/engine/arithmetic/primes.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { ARITHMETIC_NAMES, type ArithmeticName, METHOD_NAMES, type Method } from '../../shared/engine/methods/computation.ts'
import { type Goal, readWidth } from '../../shared/engine/methods/goal.ts'
import { type DefinitionText, canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import type { Definition, SetOfIntegers } from '../../shared/engine/sets/definition.ts'
import { LIMITS } from '../../shared/limits.ts'

/** What the command line asks for. */
export interface EncloseOrder {
  definitions: Definition[]
  /** Whether a range such as --k 1..12 was given, so that the answer is an array even for one k. */
  table: boolean
  goal: Goal
  method: Method | null
  arithmetic: ArithmeticName
  json: boolean
}

export const USAGE = `enclose: an enclosure of a sum over integers or primes, with certified digits

  --set primes|almost-primes|squarefree-almost-primes|distinct-prime-factors|integers|squarefree|smooth|residue-class|finite
  --k 3 or 1..12     --exclude 2,3     --coprime-to q     --y 7     --mod q --residue a     --file list.csv
  --power 1          --log-power 1     the weight n^-power (log n)^-log-power; fractions such as 1/2 are exact
  --constant twin-prime|artin|mertens      --over-primes '1/(p*(p-1))' --combine sum|product
  --digits 30, --width 1e-30 or --cutoff 1000000000      --method ${METHOD_NAMES.join('|')}
  --arithmetic ball|mpfr
  --json             one JSON object (an array for a range of k), certificate included`

const OPTIONS = {
  set: { type: 'string' },
  k: { type: 'string' },
  exclude: { type: 'string' },
  'coprime-to': { type: 'string' },
  y: { type: 'string' },
  mod: { type: 'string' },
  residue: { type: 'string' },
  file: { type: 'string' },
  power: { type: 'string' },
  'log-power': { type: 'string' },
  constant: { type: 'string' },
  'over-primes': { type: 'string' },
  combine: { type: 'string' },
  digits: { type: 'string' },
  width: { type: 'string' },
  cutoff: { type: 'string' },
  method: { type: 'string' },
  arithmetic: { type: 'string' },
  json: { type: 'boolean' },
  help: { type: 'boolean' },
} as const

type Flags = ReturnType<typeof parseFlags>
type SetKind = SetOfIntegers['kind']

/** Which flags say something about a set; any other one given with it is a mistake that is told. */
const FLAGS_OF_SET: Record<SetKind, readonly (keyof Flags)[]> = {
  primes: [],
  'almost-primes': ['k'],
  'squarefree-almost-primes': ['k'],
  'distinct-prime-factors': ['k'],
  integers: [],
  squarefree: [],
  smooth: ['y'],
  'residue-class': ['mod', 'residue'],
  finite: ['file'],
}
const SET_FLAGS = ['k', 'y', 'mod', 'residue', 'file'] as const

function parseFlags(args: string[]) {
  try {
    return parseArgs({ args: args.flatMap(joinNegative), options: OPTIONS, strict: true, allowPositionals: false }).values
  } catch (error) {
    const [message] = (error instanceof Error ? error.message : String(error)).split('\n')
    throw new EngineRefusal('bad_flag', 'flags', message.endsWith('.') ? message : `${message}.`)
  }
}

/** "--log-power -1" as "--log-power=-1": a negative number after a flag is its value and no flag. */
function joinNegative(arg: string, index: number, all: string[]): string[] {
  const isNegative = (text: string | undefined): boolean => /^-\d/.test(text ?? '')
  if (isNegative(arg) && all[index - 1]?.startsWith('--')) return []
  return arg.startsWith('--') && isNegative(all[index + 1]) ? [`${arg}=${all[index + 1]}`] : [arg]
}

/** Reads the flags; throws EngineRefusal with one line that says what does not fit. `readFile` gives the text of --file. */
export function readOrder(args: string[], readFile: (path: string) => string): EncloseOrder | 'help' {
  const flags = parseFlags(args)
  if (flags.help) return 'help'
  const ks = kRange(flags.k)
  const texts = definitionTexts(flags, ks, readFile)
  return {
    definitions: texts.map(canonicalDefinition),
    table: flags.k?.includes('..') ?? false,
    goal: readGoal(flags),
    method: oneOf(flags.method, METHOD_NAMES, 'method') ?? null,
    arithmetic: oneOf(flags.arithmetic, ARITHMETIC_NAMES, 'arithmetic') ?? 'ball',
    json: flags.json ?? false,
  }
}

function definitionTexts(flags: Flags, ks: number[], readFile: (path: string) => string): DefinitionText[] {
  const ways = [flags.set, flags.constant, flags['over-primes']].filter((value) => value !== undefined)
  if (ways.length !== 1) throw new EngineRefusal('bad_flag', 'set', 'Name what to sum: one of --set, --constant or --over-primes (see --help).')
  const exclude = [...integers(flags.exclude, 'exclude'), ...coprimeTo(flags['coprime-to'])]
  if (flags.set === undefined) {
    refuseFlags(flags, [...SET_FLAGS, 'power', 'log-power'], flags.constant !== undefined ? '--constant' : '--over-primes')
  }
  if (flags.constant !== undefined) {
    refuseFlags(flags, ['exclude', 'coprime-to', 'combine'], '--constant')
    return [{ type: 'named', name: required(oneOf(flags.constant, ['twin-prime', 'artin', 'mertens'], 'constant'), 'constant') }]
  }
  if (flags['over-primes'] !== undefined) {
    const combine = oneOf(flags.combine, ['sum', 'product'], 'combine') ?? 'sum'
    return [{ type: 'over-primes', expression: flags['over-primes'], combine, exclude }]
  }
  refuseFlags(flags, ['combine'], '--set')
  const kind = required(oneOf(flags.set, Object.keys(FLAGS_OF_SET) as SetKind[], 'set'), 'set')
  const own = FLAGS_OF_SET[kind]
  refuseFlags(flags, SET_FLAGS.filter((name) => !own.includes(name)), `--set ${kind}`)
  const missing = own.find((name) => flags[name] === undefined)
  if (missing) throw new EngineRefusal('bad_flag', missing, `--set ${kind} needs --${missing}.`)
  const weight = { power: flags.power ?? '1', logPower: flags['log-power'] ?? '1' }
  return setsOf(kind, flags, ks, exclude, readFile).map((set) => ({ type: 'series', set, weight }))
}

function setsOf(kind: SetKind, flags: Flags, ks: number[], exclude: number[], readFile: (path: string) => string): SetOfIntegers[] {
  switch (kind) {
    case 'primes':
    case 'integers':
    case 'squarefree':
      return [{ kind, exclude }]
    case 'smooth':
      return [{ kind, y: integer(flags.y ?? '', 'y'), exclude }]
    case 'residue-class':
      return [{ kind, modulus: integer(flags.mod ?? '', 'mod'), residue: integer(flags.residue ?? '', 'residue'), exclude }]
    case 'finite': {
      if (exclude.length > 0) throw new EngineRefusal('bad_flag', 'exclude', 'A finite list is what its file says: nothing can be excluded.')
      return [{ kind, members: readFile(flags.file ?? '').split(/[\s,;]+/).filter((text) => text !== '') }]
    }
    default:
      return ks.map((k) => ({ kind, k, exclude }))
  }
}

function refuseFlags(flags: Flags, names: readonly (keyof Flags)[], beside: string): void {
  const given = names.find((name) => flags[name] !== undefined)
  if (given) throw new EngineRefusal('bad_flag', given, `--${given} does not go with ${beside}.`)
}

function readGoal(flags: Flags): Goal {
  const given = [flags.digits, flags.width, flags.cutoff].filter((flag) => flag !== undefined)
  if (given.length > 1) throw new EngineRefusal('bad_flag', 'digits', 'Give one of --digits, --width and --cutoff.')
  if (flags.width !== undefined) {
    readWidth(flags.width)
    return { width: flags.width }
  }
  if (flags.cutoff !== undefined) {
    const cutoff = integer(flags.cutoff, 'cutoff')
    if (cutoff < 2 || cutoff > LIMITS.cutoff) throw new EngineRefusal('out_of_range', 'cutoff', `The cut-off must be from 2 to ${LIMITS.cutoff}.`)
    return { cutoff: String(cutoff) }
  }
  const digits = integer(flags.digits ?? '30', 'digits')
  if (digits < 1 || digits > LIMITS.digits) throw new EngineRefusal('out_of_range', 'digits', `Between 1 and ${LIMITS.digits} digits can be asked for.`)
  return { digits }
}

function kRange(text: string | undefined): number[] {
  if (text === undefined) return []
  const match = /^(\d{1,15})(?:\.\.(\d{1,15}))?$/.exec(text)
  if (!match) throw new EngineRefusal('bad_flag', 'k', `--k must be a whole number or a range such as 1..12, not "${text}".`)
  const [from, to] = [Number(match[1]), Number(match[2] ?? match[1])]
  if (to > LIMITS.k || from < 1) return [from < 1 ? from : to]
  if (to < from) throw new EngineRefusal('bad_flag', 'k', 'The range of k is empty.')
  return Array.from({ length: to - from + 1 }, (_, i) => from + i)
}

function coprimeTo(text: string | undefined): number[] {
  if (text === undefined) return []
  const q = integer(text, 'coprime-to')
  if (q < 1 || q > 1e12) throw new EngineRefusal('out_of_range', 'coprime-to', '--coprime-to must be a whole number from 1 to 10^12.')
  return isPrime(q) ? [q] : primeDivisors(q)
}

function integers(text: string | undefined, name: string): number[] {
  return text === undefined ? [] : text.split(',').map((part) => integer(part, name))
}

function integer(text: string, name: string): number {
  if (!/^-?\d{1,15}$/.test(text.trim())) throw new EngineRefusal('bad_flag', name, `--${name} must be a whole number, not "${text}".`)
  return Number(text)
}

function oneOf<T extends string>(value: string | undefined, known: readonly T[], name: string): T | undefined {
  if (value === undefined || known.includes(value as T)) return value as T | undefined
  throw new EngineRefusal('bad_flag', name, `--${name} must be one of ${known.join(', ')}, not "${value}".`)
}

function required<T>(value: T | undefined, name: string): T {
  if (value === undefined) throw new EngineRefusal('bad_flag', name, `--${name} is missing.`)
  return value
}
