import { useForm } from 'react-hook-form'
import type { DefaultValues, FieldValues, Path, UseFormReturn } from 'react-hook-form'
import type { z } from 'zod'
import { ApiError, problemOf } from './errors.ts'
import { zodResolver } from './zod-resolver.ts'

export interface ApiForm<Input extends FieldValues, Output> {
  form: UseFormReturn<Input, unknown, Output>
  /** For `onSubmit`: checks, sends, and puts what the server refuses at the fields. Nothing typed is ever cleared. */
  submit: (event?: { preventDefault?: () => void }) => Promise<void>
  /** What is wrong at a field. */
  errorAt: (path: Path<Input>) => string | undefined
  /** What is wrong with the whole. */
  rootError: string | undefined
  sending: boolean
}

/** A form over a schema of the API and the call that sends it; `send` is given the form, to reset it where that is wanted. */
export function useApiForm<Input extends FieldValues, Output>(
  schema: z.ZodType<Output, Input>,
  defaultValues: DefaultValues<Input>,
  send: (values: Output, form: UseFormReturn<Input, unknown, Output>) => Promise<unknown>,
): ApiForm<Input, Output> {
  const form = useForm<Input, unknown, Output>({ resolver: zodResolver(schema), defaultValues, shouldFocusError: true })
  const { errors, isSubmitting } = form.formState
  const submit = form.handleSubmit(async (values) => {
    try {
      await send(values, form)
    } catch (error) {
      showRefusal(error, form)
    }
  })
  return {
    form,
    submit: (event) => submit(event as never),
    errorAt: (path) => form.getFieldState(path, form.formState).error?.message,
    rootError: errors.root?.message,
    sending: isSubmitting,
  }
}

/** Field errors go to the fields that the form has, everything else to the whole form. */
function showRefusal<Input extends FieldValues, Output>(error: unknown, form: UseFormReturn<Input, unknown, Output>): void {
  const fields = error instanceof ApiError ? error.fields : []
  const known = Object.keys(form.getValues())
  const elsewhere = fields.filter(({ path }) => !known.includes(path.split('.')[0] ?? ''))
  for (const { path, message } of fields) {
    if (known.includes(path.split('.')[0] ?? '')) form.setError(path as Path<Input>, { type: 'server', message }, { shouldFocus: true })
  }
  const placed = fields.length > 0 && elsewhere.length === 0
  if (!placed) form.setError('root', { type: 'server', message: [problemOf(error).detail, ...elsewhere.map(({ message }) => message)].join(' ') })
}
