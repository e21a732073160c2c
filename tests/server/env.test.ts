import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { readEnv } from '../../server/env.ts'
import { fieldErrors } from '../../server/middleware/field-errors.ts'

const DATABASE_URL = 'postgres://a:b@127.0.0.1:5432/c'

describe('the settings', () => {
  it('need a database and nothing else', () => {
    expect(readEnv({ DATABASE_URL })).toMatchObject({ PORT: 4600, publicUrl: 'http://127.0.0.1:4600', secureCookies: false })
  })

  it('take an empty variable for an absent one', () => {
    expect(readEnv({ DATABASE_URL, PORT: '', SMTP_URL: '' }).PORT).toBe(4600)
  })

  it('make cookies secure where the public address is', () => {
    expect(readEnv({ DATABASE_URL, PUBLIC_URL: 'https://merestone.example/' })).toMatchObject({ publicUrl: 'https://merestone.example', secureCookies: true })
  })

  it('are refused with every mistake at once', () => {
    expect(() => readEnv({ PORT: '99999', SESSION_SECRET: 'short', SMTP_URL: 'http://x' })).toThrow(/DATABASE_URL[^]*PORT[^]*SESSION_SECRET[^]*SMTP_URL/)
  })
})

describe('the errors of a failed parse', () => {
  const errorsOf = (schema: z.ZodType, value: unknown) => fieldErrors(schema.safeParse(value).error!)

  it('carry dotted paths and plain words', () => {
    const schema = z.object({ a: z.object({ b: z.array(z.number().int().max(9)) }), c: z.enum(['x', 'y']), d: z.string().min(2), e: z.literal('z') })
    expect(errorsOf(schema, { a: { b: [1, 2.5, 10, '3'] }, c: 'q', d: 'd' })).toEqual([
      { path: 'a.b.1', message: 'must be a whole number' },
      { path: 'a.b.2', message: 'must be at most 9' },
      { path: 'a.b.3', message: 'must be a number' },
      { path: 'c', message: 'must be one of x, y' },
      { path: 'd', message: 'is too short: at least 2' },
      { path: 'e', message: 'must be z' },
    ])
  })

  it('are those of the form of a union that fits best', () => {
    const union = z.object({ goal: z.union([z.object({ digits: z.number().max(9) }), z.object({ cutoff: z.string() })]) })
    expect(errorsOf(union, { goal: { digits: 10 } })).toEqual([{ path: 'goal.digits', message: 'must be at most 9' }])
    expect(errorsOf(union, { goal: 7 })).toEqual([{ path: 'goal', message: 'is not one of the accepted forms' }])
  })

  it('leave the words of a schema alone', () => {
    expect(errorsOf(z.object({ k: z.number({ error: 'write k' }) }), {})).toEqual([{ path: 'k', message: 'write k' }])
  })
})
