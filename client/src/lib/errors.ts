import type { Problem } from '../../../shared/schemas/common.ts'

/** A refusal by the server (RFC 9457), or a request that had no answer (`status` 0). */
export class ApiError extends Error {
  readonly status: number
  readonly code: string
  /** What is wrong at which field, by dotted path. */
  readonly fields: { path: string; message: string }[]
  readonly requestId: string | undefined

  constructor(problem: Pick<Problem, 'status' | 'code' | 'detail' | 'fields' | 'requestId'>) {
    super(problem.detail)
    this.name = 'ApiError'
    this.status = problem.status
    this.code = problem.code
    this.fields = problem.fields ?? []
    this.requestId = problem.requestId
  }
}

/** What to tell a person about anything that was thrown. */
export interface ToldProblem {
  detail: string
  /** What is wrong at single entries, where no form shows it. */
  fields: { path: string; message: string }[]
  /** To quote in a report; only where the fault may be the server's. */
  requestId: string | undefined
  /** Whether asking again may help. */
  passing: boolean
}

export function problemOf(error: unknown): ToldProblem {
  if (!(error instanceof ApiError)) return { detail: 'Something went wrong in this page. Reload it; what you saved on the server is safe.', fields: [], requestId: undefined, passing: true }
  const ours = error.status === 0 || error.status === 429 || error.status >= 500
  return { detail: error.message, fields: error.fields, requestId: ours ? error.requestId : undefined, passing: ours }
}

/** The message for one field of a refusal, by its path. */
export function fieldProblem(error: unknown, path: string): string | undefined {
  return error instanceof ApiError ? error.fields.find((field) => field.path === path)?.message : undefined
}

/** True when the server refused because nobody is signed in (any more). */
export function isSignedOut(error: unknown): boolean {
  return error instanceof ApiError && error.status === 401
}
