import { planInput } from '../../../../shared/schemas/run.ts'
import type { SetKind } from '../../../../shared/engine/sets/definition.ts'
import type { PlanInput } from './queries.ts'

/** What the form of a new run holds: everything as it was typed. */
export interface RunFormValues {
  type: 'series' | 'over-primes' | 'named'
  set: SetKind
  k: string
  y: string
  modulus: string
  residue: string
  members: string
  exclude: string
  power: string
  logPower: string
  expression: string
  combine: 'sum' | 'product'
  name: 'mertens' | 'twin-prime' | 'artin'
  goal: 'digits' | 'width' | 'cutoff'
  digits: string
  width: string
  cutoff: string
}

export type RunField = keyof RunFormValues

export const BLANK_RUN: RunFormValues = {
  type: 'series', set: 'almost-primes', k: '3', y: '', modulus: '', residue: '', members: '', exclude: '', power: '1', logPower: '1',
  expression: '', combine: 'sum', name: 'mertens', goal: 'digits', digits: '30', width: '1e-30', cutoff: '1000000000',
}

export const SETS_WITH_K: readonly SetKind[] = ['almost-primes', 'squarefree-almost-primes', 'distinct-prime-factors']

export type FieldMessages = Partial<Record<RunField, string>>

/** The request that the form stands for, or what is wrong at which field. */
export type ReadRun = { input: PlanInput; errors: null } | { input: null; errors: FieldMessages }

/** Reads the form by the API's own schema, so that the form takes exactly what the server takes. */
export function readRunForm(values: RunFormValues): ReadRun {
  const typed = {
    definition: definitionOf(values),
    goal: goalOf(values),
  }
  const parsed = planInput.safeParse(typed)
  if (parsed.success) return { input: typed as PlanInput, errors: null }
  const errors: FieldMessages = {}
  for (const issue of parsed.error.issues) {
    const field = fieldOf(issue.path.map(String).join('.'), values)
    if (field) errors[field] ??= plainMessage(field, issue.message)
  }
  return { input: null, errors }
}

function goalOf(values: RunFormValues): unknown {
  if (values.goal === 'digits') return { digits: wholeNumber(values.digits) }
  return values.goal === 'width' ? { width: minus(values.width) } : { cutoff: values.cutoff.replace(/[\s_]/g, '') }
}

function definitionOf(values: RunFormValues): unknown {
  const exclude = listOf(values.exclude).map(wholeNumber)
  if (values.type === 'named') return { type: 'named', name: values.name }
  if (values.type === 'over-primes') return { type: 'over-primes', expression: values.expression, combine: values.combine, exclude }
  return { type: 'series', set: setOf(values, exclude), weight: { power: minus(values.power), logPower: minus(values.logPower) } }
}

function setOf(values: RunFormValues, exclude: number[]): unknown {
  const { set: kind } = values
  if (SETS_WITH_K.includes(kind)) return { kind, k: wholeNumber(values.k), exclude }
  if (kind === 'smooth') return { kind, y: wholeNumber(values.y), exclude }
  if (kind === 'residue-class') return { kind, modulus: wholeNumber(values.modulus), residue: wholeNumber(values.residue), exclude }
  if (kind === 'finite') return { kind, members: listOf(values.members) }
  return { kind, exclude }
}

/** NaN for what is no whole number, which the schema then refuses. */
function wholeNumber(text: string): number {
  return /^\s*\d+\s*$/.test(text) ? Number(text) : Number.NaN
}

function listOf(text: string): string[] {
  return text.split(/[\s,;]+/).filter((item) => item !== '')
}

/** A typographic minus sign is as good as the one on the keyboard. */
function minus(text: string): string {
  return text.replace('−', '-').trim()
}

const FIELDS: Record<string, RunField> = {
  k: 'k', y: 'y', modulus: 'modulus', residue: 'residue', members: 'members', exclude: 'exclude', power: 'power', logPower: 'logPower',
  expression: 'expression', name: 'name', digits: 'digits', width: 'width', cutoff: 'cutoff', set: 'set', kind: 'set', combine: 'combine',
}

/** The field of the form that a path of the request ("definition.set.exclude.0") belongs to. */
export function fieldOf(path: string, values: Pick<RunFormValues, 'goal' | 'type'>): RunField | null {
  const steps = path.split('.').filter((step) => !/^\d+$/.test(step))
  const last = steps.at(-1) ?? ''
  if (last === 'goal') return values.goal
  if (last === 'definition') return values.type === 'over-primes' ? 'expression' : 'set'
  return FIELDS[last] ?? null
}

const WHOLE: Partial<Record<RunField, string>> = {
  k: 'Write a whole number, 1 or more.',
  y: 'Write a whole number.',
  modulus: 'Write a whole number.',
  residue: 'Write a whole number.',
  exclude: 'Write primes, separated by commas.',
  members: 'Write whole numbers, separated by commas or line breaks.',
  digits: 'Write a whole number.',
  expression: 'Write an expression in p.',
}

/** The schema's own words where they are meant for people, ours where a number could not be read at all. */
function plainMessage(field: RunField, message: string): string {
  const technical = /^(Invalid|Expected|Too (small|big))/i.test(message)
  return technical ? (WHOLE[field] ?? message) : message
}
