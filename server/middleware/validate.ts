import type { Request, RequestHandler } from 'express'
import { z } from 'zod'
import { invalid, type FieldError } from '../errors.ts'
import { fieldErrors } from './field-errors.ts'

/** Where a route's input comes from. Path parameters win over query and body where names meet. */
export interface RequestSchemas {
  params?: z.ZodType
  query?: z.ZodType
  body?: z.ZodType
}

type Output<S, Part extends keyof RequestSchemas> = S extends Record<Part, infer T extends z.ZodType> ? z.output<T> : unknown
export type InputOf<S extends RequestSchemas> = Output<S, 'params'> & Output<S, 'query'> & Output<S, 'body'>

/** A request after `validate(schemas)`: `input` holds the parsed fields of path, query and body side by side. */
export interface Validated<S extends RequestSchemas> extends Request {
  input: InputOf<S>
}

/** Parses every part that has a schema into `req.input`; a 400 lists all field errors of all parts. */
export function validate(schemas: RequestSchemas): RequestHandler & { schemas: RequestSchemas } {
  const check: RequestHandler = (req, _res, next) => {
    const given = { body: req.body ?? {}, query: req.query, params: req.params }
    const errors: FieldError[] = []
    const input = {}
    for (const part of ['body', 'query', 'params'] as const) {
      const parsed = schemas[part]?.safeParse(given[part])
      if (parsed?.success) {
        Object.assign(input, parsed.data)
        errors.push(...unkeepable(parsed.data))
      } else if (parsed) errors.push(...fieldErrors(parsed.error))
    }
    errors.push(...unknownIn(schemas.query, req.query))
    if (errors.length > 0) throw invalid(errors)
    req.input = input
    next()
  }
  return Object.assign(check, { schemas })
}

/** What an address asks for besides what it may: a misspelt filter that is passed over would look like a result. */
function unknownIn(schema: z.ZodType | undefined, query: Request['query']): FieldError[] {
  if (!(schema instanceof z.ZodObject)) return []
  return Object.keys(query).filter((name) => !Object.hasOwn(schema.shape, name)).map((name) => ({ path: name, message: 'is nothing that can be asked for here' }))
}

/** Texts with a zero character or half a surrogate pair, which PostgreSQL cannot keep. */
function unkeepable(value: unknown, path: string[] = []): FieldError[] {
  if (typeof value === 'string') return value.includes('\0') || /\p{Surrogate}/u.test(value) ? [{ path: path.join('.'), message: 'holds a character that is none' }] : []
  if (value === null || typeof value !== 'object') return []
  return Object.entries(value).flatMap(([key, member]) => unkeepable(member, [...path, key]))
}
