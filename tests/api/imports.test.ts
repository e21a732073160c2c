import { beforeAll, describe, expect, it } from 'vitest'
import '../support/test-database.ts'
import { parseCsv } from '../../shared/csv.ts'
import { createApp } from '../../server/app.ts'
import { selectOne } from '../../server/db.ts'
import { definitionOfWords } from '../../server/engine/definition-words.ts'
import { type Agent, makeMember, signedInAs, type TestMember } from '../support/people.ts'
import { makeClaim, makeConstant, series } from '../support/register.ts'

const HEAD = 'definition,digits,reading,source\n'

describe('a CSV text', () => {
  it('has quoted fields, doubled quotes, line breaks in fields, semicolons, and lines that are counted', () => {
    expect(parseCsv('a,b\n"x, ""y""\nz", 1 \n\nq,2')).toEqual([
      { line: 1, fields: ['a', 'b'] },
      { line: 2, fields: ['x, "y"\nz', '1'] },
      { line: 5, fields: ['q', '2'] },
    ])
    expect(parseCsv('a;b\r\n1,5;2\r\n')).toEqual([{ line: 1, fields: ['a', 'b'] }, { line: 2, fields: ['1,5', '2'] }])
  })
})

describe('a definition in words', () => {
  it.each([
    ['odd, k = 3', { kind: 'almost-primes', k: 3, exclude: [2] }],
    ['1/(p log p)', { kind: 'primes', exclude: [] }],
    ['squarefree, k = 2', { kind: 'squarefree-almost-primes', k: 2, exclude: [] }],
    ['primes excluding 2, 3', { kind: 'primes', exclude: [2, 3] }],
  ])('%s', (text, set) => {
    expect(definitionOfWords(text)).toEqual({ type: 'series', set, weight: { power: '1', logPower: '1' } })
  })

  it('has a weight, a name or a number', () => {
    expect(definitionOfWords('k = 2, 1/(n^2 log^3 n)')).toMatchObject({ weight: { power: '2', logPower: '3' } })
    expect(definitionOfWords('Mertens')).toEqual({ type: 'named', name: 'mertens' })
    expect(definitionOfWords('MST-0007')).toEqual({ number: 7 })
  })

  it.each(['', 'lucky numbers', 'palindromic primes', '1.6366'])('refuses "%s" rather than guess', (text) => {
    expect(() => definitionOfWords(text)).toThrow(/write a register number/)
  })
})

describe('an import of a table of digits', () => {
  let member: TestMember
  let agent: Agent
  const app = createApp()
  const send = (path: string, text: string | Buffer) => agent.post(path).attach('file', Buffer.from(text as string), 'table.csv')

  beforeAll(async () => {
    member = await makeMember({ roles: ['researcher'] })
    agent = await signedInAs(member, app)
    // k = 1 to 8 places, signed: 1.6366… (Forum Math. Pi 11 (2023) e18, p. 2; more digits by reference libraries).
    const constant = await makeConstant(member, series({ kind: 'primes', exclude: [] }))
    await makeClaim(member, constant, { state: 'signed', lo: '1.63661632', hi: '1.63661633' })
  })

  const TABLE = `${HEAD}1/(p log p),1.6366163233,truncated,"Table 1, row 1"\nprimes,1.7,rounded,Table 1\n"odd, k = 1",0.9152688029,truncated,Table 1\nlucky numbers,1.0,truncated,Table 1\nk = 2,1.14x,truncated,Table 1\nk = 2,1.1448,maybe,Table 1\nk = 0,1.1,truncated,Table 1\nk = 2,1.1448,truncated,\n`

  it('is previewed line by line, and the preview changes nothing', async () => {
    const before = await selectOne<{ n: string }>('SELECT count(*) AS n FROM claims', {})
    const { body } = await send('/api/v1/imports/preview', TABLE).expect(200)
    expect(body.lines.map((one: { line: number; verdict: string }) => [one.line, one.verdict])).toEqual([
      [2, 'meets'], [3, 'contradicts'], [4, 'new'], [5, 'bad'], [6, 'bad'], [7, 'bad'], [8, 'bad'], [9, 'bad'],
    ])
    expect(body.lines[0].enclosure).toEqual({ lo: '1.6366163233', hi: '1.6366163234' })
    expect(body.lines[3].message).toMatch(/"lucky" is not understood/)
    expect(body.lines[6].message).toMatch(/k/)
    expect(await selectOne('SELECT count(*) AS n FROM claims', {})).toEqual(before)
  })

  it('drafts what can be read and tells what was left out', async () => {
    const { body } = await send('/api/v1/imports', TABLE).expect(201)
    expect(body.drafts.map((one: { line: number }) => one.line)).toEqual([2, 3, 4])
    expect(body.left.map((one: { line: number }) => one.line)).toEqual([5, 6, 7, 8, 9])
    const claim = (await agent.get(`/api/v1/claims/${body.drafts[0].claimId}`).expect(200)).body
    expect(claim).toMatchObject({ state: 'draft', kind: 'stated', repeatedHere: false, source: 'Table 1, row 1' })
  })

  it.each([
    ['another encoding', Buffer.from([0xff, 0xfe, 0x64, 0x00]), /UTF-8/],
    ['no heading', 'primes,1.63,truncated,x\n', /no column definition/],
    ['nothing under the heading', HEAD, /no line/],
    ['too many lines', HEAD + 'primes,1.6,truncated,x\n'.repeat(2_001), /at most 2,000/],
  ])('refuses %s at the field', async (_name, text, reason) => {
    const { body } = await send('/api/v1/imports', text).expect(400)
    expect(body.fields[0]).toMatchObject({ path: 'file', message: expect.stringMatching(reason) })
  })

  it('keeps the good lines beside a cell that no pattern should meet or no database can keep', async () => {
    const long = '1'.repeat(200_000)
    const text = `${HEAD}${long},1.14,rounded,x\nk = 2,1.${long},rounded,x\nk = 2,1.14,rounded,${long}\nk = 2,1.14,rounded,a\0b\nk = 2,1.14,rounded,good\n`
    const { body } = await send('/api/v1/imports', text).expect(201)
    expect(body.drafts.map((one: { line: number }) => one.line)).toEqual([6])
    expect(body.left.map((one: { message: string }) => one.message)).toEqual([
      'More than 200 characters in the column definition.', 'More than 20,000 characters in the column digits.', 'More than 20,000 characters in the column source.', 'A character that is none in the column source.',
    ])
  })

  it('refuses a table that would hold the server up', async () => {
    const { body } = await send('/api/v1/imports/preview', HEAD + 'primes,1.6,truncated,x\n'.repeat(200_000)).expect(413)
    expect(body.detail).toMatch(/at most 4 MB/)
  })

  it('is for researchers', async () => {
    const referee = await signedInAs(await makeMember({ roles: ['referee'] }), app)
    await referee.post('/api/v1/imports/preview').attach('file', Buffer.from(TABLE), 'table.csv').expect(403)
  })
})
