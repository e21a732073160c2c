import { problem as problemSchema } from '../../../shared/schemas/common.ts'
import { ApiError } from './errors.ts'

const BASE = '/api/v1'

export type Query = Record<string, string | number | boolean | undefined>

interface RequestOptions {
  body?: unknown
  /** A form with files, in place of a JSON body. */
  form?: FormData
  query?: Query
  signal?: AbortSignal
}

function address(path: string, query: Query = {}): string {
  const entries = Object.entries(query).flatMap(([key, value]) => (value === undefined || value === '' ? [] : [[key, String(value)]]))
  return entries.length === 0 ? BASE + path : `${BASE}${path}?${new URLSearchParams(entries)}`
}

async function send<Answer>(method: string, path: string, { body, form, query, signal }: RequestOptions = {}): Promise<Answer> {
  const headers: Record<string, string> = { accept: 'application/json' }
  if (method !== 'GET') headers['X-Merestone'] = '1'
  if (body !== undefined) headers['content-type'] = 'application/json'
  let response: Response
  try {
    response = await fetch(address(path, query), {
      method, headers, credentials: 'same-origin',
      ...(form ? { body: form } : body === undefined ? {} : { body: JSON.stringify(body) }),
      ...(signal ? { signal } : {}),
    })
  } catch (error) {
    if (signal?.aborted) throw error
    throw new ApiError({ status: 0, code: 'unreachable', detail: 'The server can’t be reached. Check the connection and try again; nothing was lost here.' })
  }
  if (response.ok) return (response.status === 204 ? undefined : await response.json()) as Answer
  throw await refusal(response)
}

/** The server's problem+json as an error; whatever else came back becomes one that says so. */
async function refusal(response: Response): Promise<ApiError> {
  const parsed = problemSchema.safeParse(await response.json().catch(() => null))
  if (parsed.success) return new ApiError(parsed.data)
  return new ApiError({ status: response.status, code: 'unexpected_answer', detail: `The server answered ${response.status} and gave no reason. Try again in a moment.` })
}

/** Calls to the API. Every call throws an ApiError where the server refuses or can't be reached. */
export const api = {
  get: <Answer>(path: string, options?: RequestOptions) => send<Answer>('GET', path, options),
  post: <Answer>(path: string, body: unknown = {}, options?: RequestOptions) => send<Answer>('POST', path, { ...options, body }),
  put: <Answer>(path: string, body: unknown, options?: RequestOptions) => send<Answer>('PUT', path, { ...options, body }),
  patch: <Answer>(path: string, body: unknown, options?: RequestOptions) => send<Answer>('PATCH', path, { ...options, body }),
  delete: <Answer>(path: string, options?: RequestOptions) => send<Answer>('DELETE', path, options),
  upload: <Answer>(path: string, form: FormData) => send<Answer>('POST', path, { form }),
}
