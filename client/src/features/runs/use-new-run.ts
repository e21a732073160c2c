import { useEffect, useState } from 'react'
import { useForm, useWatch } from 'react-hook-form'
import { ApiError } from '../../lib/errors.ts'
import type { Choice } from './components/forecast-table.tsx'
import type { PlanInput } from './queries.ts'
import { fieldOf, readRunForm } from './run-form.ts'
import type { FieldMessages, RunField, RunFormValues } from './run-form.ts'

/** Typing is over when nothing has changed for this many milliseconds; then the forecast is asked for. */
const SETTLE = 350

/** State of the form of a new run: what is typed, what it reads as, and which forecast was chosen. */
export function useNewRun(initial: RunFormValues) {
  const form = useForm<RunFormValues>({ defaultValues: initial })
  const values = { ...initial, ...useWatch({ control: form.control }) } as RunFormValues
  const [choice, setChoice] = useState<{ choice: Choice; of: string } | null>(null)
  const [settledText, setSettledText] = useState(() => JSON.stringify(readRunForm(initial).input))

  const reading = readRunForm(values)
  const text = JSON.stringify(reading.input)
  useEffect(() => {
    const timer = setTimeout(() => setSettledText(text), SETTLE)
    return () => clearTimeout(timer)
  }, [text])

  const settled = JSON.parse(settledText) as PlanInput | null
  return {
    form,
    /** The request as it stood when typing paused; null while the form can't be read. */
    settled: reading.input ? settled : null,
    settling: text !== settledText,
    /** A choice holds for the request it was made for: another definition has other forecasts. */
    chosen: choice?.of === text ? choice.choice : null,
    choose: (next: Choice) => setChoice({ choice: next, of: text }),
    read: () => reading.input,
    /** What is wrong at the fields: what can't be read here, then what the server refuses of what it was last asked. */
    errorsWith: (refusal: unknown): FieldMessages => {
      // What is not filled in yet is not wrong, and needs no words.
      if (reading.errors) return Object.fromEntries(Object.entries(reading.errors).map(([field, message]) => [field, values[field as RunField] === '' ? '' : message]))
      if (!(refusal instanceof ApiError) || text !== settledText) return {}
      const errors: FieldMessages = {}
      for (const { path, message } of refusal.fields) {
        const field = fieldOf(path, values)
        if (field) errors[field] ??= message
      }
      return errors
    },
  }
}
