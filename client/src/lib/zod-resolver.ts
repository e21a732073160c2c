import type { FieldErrors, FieldValues, Resolver } from 'react-hook-form'
import type { z } from 'zod'

/** Checks a form with a schema of the API: what passes here is what the server is sent. */
export function zodResolver<Input extends FieldValues, Output>(schema: z.ZodType<Output, Input>): Resolver<Input, unknown, Output> {
  return async (values) => {
    const parsed = schema.safeParse(values)
    if (parsed.success) return { values: parsed.data as never, errors: {} }
    const errors: Record<string, unknown> = {}
    for (const issue of parsed.error.issues) place(errors, issue.path, { type: issue.code, message: issue.message })
    return { values: {}, errors: errors as FieldErrors<Input> }
  }
}

/** Puts an error where its path leads; the first one of a field stands. */
function place(errors: Record<string, unknown>, path: PropertyKey[], error: object): void {
  let at = errors
  for (const step of path.slice(0, -1)) at = (at[String(step)] ??= {}) as Record<string, unknown>
  at[String(path.at(-1) ?? 'root')] ??= error
}
