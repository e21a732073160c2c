import type { Problem as ProblemBody } from '../shared/schemas/common.ts'

export type FieldError = NonNullable<ProblemBody['fields']>[number]

const TITLES: Record<number, string> = {
  400: 'The request is not understood',
  401: 'Not signed in',
  403: 'Not allowed',
  404: 'Not found',
  405: 'Method not allowed',
  409: 'In the way',
  410: 'No longer there',
  412: 'Changed in the meantime',
  413: 'Too large',
  415: 'Type not accepted',
  422: 'Cannot be done',
  429: 'Too many requests',
  500: 'Something went wrong here',
  503: 'Not available now',
}

/** A refusal that a person can act on. It leaves the server as `application/problem+json` (RFC 9457). */
export class Problem extends Error {
  readonly status: number
  readonly code: string
  readonly fields: FieldError[] | undefined
  readonly headers: Record<string, string>

  constructor(status: number, code: string, detail: string, more: { fields?: FieldError[]; headers?: Record<string, string> } = {}) {
    super(detail)
    this.name = 'Problem'
    this.status = status
    this.code = code
    this.fields = more.fields
    this.headers = more.headers ?? {}
  }

  /** What kind of refusal it is, in words. */
  get title(): string {
    return TITLES[this.status] ?? 'Refused'
  }

  /** The body that is sent. */
  body(requestId: string | undefined): ProblemBody {
    return {
      type: 'about:blank',
      title: this.title,
      status: this.status,
      code: this.code,
      detail: this.message,
      ...(this.fields && { fields: this.fields }),
      ...(requestId && { requestId }),
    }
  }
}

/** 400: one or more fields are wrong; every one is named. */
export const invalid = (fields: FieldError[], detail = 'Some entries need another look.'): Problem =>
  new Problem(400, 'invalid_input', detail, { fields })

/** 400 for a single field, found wrong after the schema had passed it. */
export const invalidField = (path: string, message: string): Problem => invalid([{ path, message }])

export const badRequest = (code: string, detail: string): Problem => new Problem(400, code, detail)

export const unauthenticated = (detail = 'Sign in to go on.'): Problem =>
  new Problem(401, 'not_signed_in', detail, { headers: { 'WWW-Authenticate': 'Bearer' } })

/** 403: signed in, but this act on this thing is not theirs. The code says which rule: "own_claim", "role_needed", … */
export const forbidden = (code = 'not_allowed', detail = 'Your roles do not allow this.'): Problem => new Problem(403, code, detail)

/** 404, also for what exists but may not be seen: the answer must not tell the two apart. */
export const notFound = (what = 'page'): Problem =>
  new Problem(404, 'not_found', `There is no such ${what}, or it is not open to you.`)

/** 409: the thing is not in the state that the act needs, or somebody else was quicker. */
export const conflict = (code: string, detail: string): Problem => new Problem(409, code, detail)

/** 410: a link that has been used or has expired. */
export const gone = (code: string, detail: string): Problem => new Problem(410, code, detail)

export const tooLarge = (detail: string): Problem => new Problem(413, 'too_large', detail)

export const unsupportedType = (detail: string): Problem => new Problem(415, 'type_not_accepted', detail)

/** 422: understood, but it cannot be done; `field` names the input at fault where there is one. */
export const unprocessable = (code: string, detail: string, field?: string): Problem =>
  new Problem(422, code, detail, field === undefined ? {} : { fields: [{ path: field, message: detail }] })

export const tooMany = (seconds: number, detail: string): Problem =>
  new Problem(429, 'too_many_requests', detail, { headers: { 'Retry-After': String(Math.max(1, Math.ceil(seconds))) } })

export const unavailable = (detail: string): Problem => new Problem(503, 'not_available', detail, { headers: { 'Retry-After': '5' } })

export const internal = (): Problem =>
  new Problem(500, 'internal_error', 'This is a fault of the server, not of what you entered. Try again; if it happens again, tell whoever runs this installation, with the request number.')
