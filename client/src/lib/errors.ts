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
export function problemOf(error: unknown): { detail: string; requestId: string | undefined } {
  if (error instanceof ApiError) return { detail: error.message, requestId: error.requestId }
  return { detail: 'Something went wrong in this page. Reload it; what you saved on the server is safe.', requestId: undefined }
}

/** True when the server refused because nobody is signed in (any more). */
export function isSignedOut(error: unknown): boolean {
  return error instanceof ApiError && error.status === 401
}
