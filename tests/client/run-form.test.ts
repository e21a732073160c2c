import { describe, expect, test } from 'vitest'
import { prefillFrom } from '../../client/src/features/runs/prefill.ts'
import { BLANK_RUN, fieldOf, readRunForm } from '../../client/src/features/runs/run-form.ts'

describe('reading the form of a new run', () => {
  test('a series with exclusions and a fraction', () => {
    expect(readRunForm({ ...BLANK_RUN, k: ' 3 ', exclude: '2, 5', logPower: '−1/2', digits: '40' }).input).toEqual({
      definition: { type: 'series', set: { kind: 'almost-primes', k: 3, exclude: [2, 5] }, weight: { power: '1', logPower: '-1/2' } },
      goal: { digits: 40 },
    })
  })
  test('a cut-off may be written in groups', () => {
    expect(readRunForm({ ...BLANK_RUN, set: 'primes', goal: 'cutoff', cutoff: '1 000 000' }).input).toEqual({
      definition: { type: 'series', set: { kind: 'primes', exclude: [] }, weight: { power: '1', logPower: '1' } },
      goal: { cutoff: '1000000' },
    })
  })
  test('a width goes as it is typed, and what is none is told at its field', () => {
    expect(readRunForm({ ...BLANK_RUN, goal: 'width', width: ' 2.5e−30 ' }).input?.goal).toEqual({ width: '2.5e-30' })
    expect(readRunForm({ ...BLANK_RUN, goal: 'width', width: '30 digits' }).errors).toEqual({ width: 'write a decimal below 1 and not below 1e-1000, such as 1e-30' })
  })
  test('a finite list takes commas and line breaks', () => {
    expect(readRunForm({ ...BLANK_RUN, set: 'finite', members: '6, 10\n15' }).input?.definition).toMatchObject({ set: { kind: 'finite', members: ['6', '10', '15'] } })
  })
  test('every field that can’t be read is told in words, all at once', () => {
    expect(readRunForm({ ...BLANK_RUN, k: 'three', exclude: '2, x', power: '1,5', digits: '4000' }).errors).toEqual({
      k: 'Write a whole number, 1 or more.',
      exclude: 'Write primes, separated by commas.',
      power: 'write a whole number, a fraction such as 1/2, or a decimal',
      digits: 'at most 1000 digits',
    })
  })
  test('what the server says of a path stands at its field', () => {
    expect(fieldOf('definition.set.exclude.1', BLANK_RUN)).toBe('exclude')
    expect(fieldOf('definition.weight.logPower', BLANK_RUN)).toBe('logPower')
    expect(fieldOf('goal', { ...BLANK_RUN, goal: 'cutoff' })).toBe('cutoff')
    expect(fieldOf('definition', { ...BLANK_RUN, type: 'over-primes' })).toBe('expression')
    expect(fieldOf('unheard-of', BLANK_RUN)).toBeNull()
  })
})

describe('filling the form from a constant', () => {
  test('reads back to the same definition', () => {
    const definition = { type: 'series' as const, set: { kind: 'residue-class' as const, modulus: 4, residue: 3, exclude: [7] }, weight: { power: '1', logPower: '2' } }
    expect(readRunForm(prefillFrom(definition)).input?.definition).toEqual(definition)
  })
  test('a rational function is written out as it is typed', () => {
    expect(prefillFrom({ type: 'over-primes', numerator: ['1'], denominator: ['0', '-1', '1'], combine: 'sum', exclude: [2] })).toMatchObject({ expression: '1/(p^2 - p)', exclude: '2' })
  })
})
