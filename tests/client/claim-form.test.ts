import { describe, expect, test } from 'vitest'
import { BLANK_CLAIM, claimForm } from '../../client/src/features/claims/claim-form.ts'
import type { ClaimFormValues } from '../../client/src/features/claims/claim-form.ts'

const read = (values: Partial<ClaimFormValues>) => claimForm.safeParse({ ...BLANK_CLAIM, ...values })
const errors = (values: Partial<ClaimFormValues>) => read(values).error?.issues.map((issue) => issue.path.join('.')) ?? []

describe('the form of a claim without a run', () => {
  test('digits with their reading and source', () => {
    expect(read({ constant: ' MST-0001 ', digits: '1.63661 63233…', form: 'rounded', source: 'Table 2' }).data).toEqual({
      kind: 'stated', constant: 'MST-0001', value: { digits: '1.63661 63233…', reading: 'rounded' }, source: 'Table 2', remark: '',
    })
  })
  test('an interval', () => {
    expect(read({ constant: 'MST-0001', form: 'interval', lo: '1.6', hi: '1.7', source: 'Table 2' }).data).toMatchObject({ value: { lo: '1.6', hi: '1.7' } })
  })
  test('an order', () => {
    expect(read({ kind: 'order', lesser: 'MST-0006', greater: 'MST-0007' }).data).toEqual({ kind: 'order', lesser: 'MST-0006', greater: 'MST-0007', remark: '' })
  })
  test('what is wrong stands at its field', () => {
    expect(errors({ constant: '42', digits: '', source: '' })).toEqual(expect.arrayContaining(['constant', 'digits', 'source']))
    expect(errors({ constant: 'MST-0001', form: 'interval', lo: '1,6', hi: '1.7', source: 'x' })).toEqual(['lo'])
    expect(errors({ kind: 'order', lesser: 'MST-0006', greater: 'seven' })).toEqual(['greater'])
  })
})
