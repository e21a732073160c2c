import { z } from 'zod'
import { claimInput } from '../../../../shared/schemas/claim.ts'
import type { ClaimInput } from '../../../../shared/schemas/claim.ts'

/** What the form of a claim without a run holds, as typed; it is checked by the API's own schema after it is read. */
export interface ClaimFormValues {
  kind: 'stated' | 'order'
  constant: string
  form: 'truncated' | 'rounded' | 'interval'
  digits: string
  lo: string
  hi: string
  source: string
  lesser: string
  greater: string
  remark: string
}

export const BLANK_CLAIM: ClaimFormValues = { kind: 'stated', constant: '', form: 'truncated', digits: '', lo: '', hi: '', source: '', lesser: '', greater: '', remark: '' }

function inputOf(values: ClaimFormValues): unknown {
  const { kind, remark } = values
  if (kind === 'order') return { kind, lesser: values.lesser.trim(), greater: values.greater.trim(), remark }
  const value = values.form === 'interval' ? { lo: values.lo.trim(), hi: values.hi.trim() } : { digits: values.digits, reading: values.form }
  return { kind, constant: values.constant.trim(), value, source: values.source, remark }
}

/** Fields of the form by the last step of a path of the request. */
const FIELDS: Record<string, keyof ClaimFormValues> = { constant: 'constant', digits: 'digits', lo: 'lo', hi: 'hi', source: 'source', lesser: 'lesser', greater: 'greater', remark: 'remark' }

/** Reads the form as a request; what the schema refuses stands at the field that it came from. */
export const claimForm = z.custom<ClaimFormValues>().transform((values, context): ClaimInput => {
  const typed = inputOf(values)
  if (values.kind === 'stated') {
    for (const field of values.form === 'interval' ? (['lo', 'hi'] as const) : (['digits'] as const)) {
      if (values[field].trim() === '') context.addIssue({ code: 'custom', path: [field], message: 'is needed' })
    }
  }
  const parsed = claimInput.safeParse(typed)
  if (!parsed.success) {
    for (const issue of parsed.error.issues) {
      // A value that fits neither digits nor interval is one issue on the union: the interval's ends are then at fault.
      const last = String(issue.path.at(-1) ?? '')
      const field = last === 'value' ? (values.form === 'interval' ? 'lo' : 'digits') : (FIELDS[last] ?? 'remark')
      context.addIssue({ code: 'custom', path: [field], message: last === 'value' ? 'write a plain decimal number' : issue.message })
    }
  }
  return typed as ClaimInput
})
