import type { z } from 'zod'
import type { FieldError } from '../errors.ts'

type Issue = z.core.$ZodIssue

const EXPECTED: Record<string, string> = {
  string: 'must be text',
  number: 'must be a number',
  int: 'must be a whole number',
  boolean: 'must be true or false',
  array: 'must be a list',
  object: 'must be an object',
}

/** A message for a person: schemas that state their own are left alone, zod's stock phrases are turned into plain words. */
function wording(issue: Issue): string {
  if (!/^(Invalid|Too (small|big)|Unrecognized)/.test(issue.message)) return issue.message
  switch (issue.code) {
    case 'invalid_type':
      return /received undefined/.test(issue.message) ? 'is needed' : (EXPECTED[issue.expected] ?? 'has the wrong type')
    case 'invalid_value':
      return `must be ${issue.values.length === 1 ? '' : 'one of '}${issue.values.map(String).join(', ')}`
    case 'too_small':
      return issue.origin === 'string' || issue.origin === 'array' ? `is too short: at least ${issue.minimum}` : `must be at least ${issue.minimum}`
    case 'too_big':
      return issue.origin === 'string' || issue.origin === 'array' ? `is too long: at most ${issue.maximum}` : `must be at most ${issue.maximum}`
    case 'unrecognized_keys':
      return `is not known here: ${issue.keys.join(', ')}`
    case 'invalid_union':
      return 'is not one of the accepted forms'
    default:
      return 'is not valid'
  }
}

/** How far into the input the branch of a union got before it failed: the deeper, the likelier it was meant. */
const depth = (issues: readonly Issue[]): number => Math.max(0, ...issues.map((issue) => issue.path.length))

function flatten(issues: readonly Issue[], prefix: PropertyKey[]): FieldError[] {
  return issues.flatMap((issue) => {
    const path = [...prefix, ...issue.path]
    if (issue.code === 'invalid_union' && issue.errors.length > 0) {
      const best = [...issue.errors].sort((a, b) => depth(b) - depth(a) || a.length - b.length)[0] ?? []
      if (depth(best) > 0) return flatten(best, path)
    }
    return [{ path: path.map(String).join('.'), message: wording(issue) }]
  })
}

/** Every mistake of a failed parse with its dotted path; of a union, those of the form that fits best. */
export function fieldErrors(error: z.core.$ZodError): FieldError[] {
  return flatten(error.issues, [])
}
