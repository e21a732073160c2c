import { execFile } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { readOrder } from '../../server/cli/flags.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import { contains } from '../support/enclosures.ts'

const root = join(import.meta.dirname, '../..')
const folder = mkdtempSync(join(tmpdir(), 'merestone-cli-'))
afterAll(() => rmSync(folder, { recursive: true }))

interface Ended {
  code: number
  out: string
  err: string
}

/** Runs a command of server/cli as a process of its own. */
function run(name: 'enclose' | 'verify', ...args: string[]): Promise<Ended> {
  return new Promise((resolve) => {
    const command = ['--import', 'tsx', join(root, 'server', 'cli', `${name}.ts`), ...args]
    execFile(process.execPath, command, { cwd: root }, (error, out, err) => resolve({ code: error ? Number(error.code) : 0, out, err }))
  })
}

describe('enclose', () => {
  it('prints one JSON object with an enclosure, its budget and its certificate', async () => {
    const { code, out } = await run('enclose', '--set', 'almost-primes', '--k', '3', '--exclude', '2', '--digits', '20', '--json')
    expect(code).toBe(0)
    const answer = JSON.parse(out) as { lo: string; hi: string; digits: number; certificate: object }
    expect(Object.keys(answer)).toEqual(['lo', 'hi', 'radius', 'digits', 'method', 'arithmetic', 'budget', 'certificate'])
    expect(answer.digits).toBeGreaterThanOrEqual(20)
    // Odd integers with three prime factors; Arb 2.23 and PARI/GP 2.15 (reference libraries).
    expect(contains(answer, '0.546010010883498718419889654689')).toBe(true)

    const file = join(folder, 'certificate.json')
    writeFileSync(file, JSON.stringify(answer.certificate))
    expect(await run('verify', file)).toMatchObject({ code: 0 })
    writeFileSync(file, readFileSync(file, 'utf8').replace(/"hi":"0\.5460/, '"hi":"0.5461'))
    const changed = await run('verify', file)
    expect(changed.code).toBe(1)
    expect(changed.out).toContain('does not hold')
  })

  it('ends, undecided, a repetition whose forged parameters ask for hours', async () => {
    const { out } = await run('enclose', '--set', 'primes', '--digits', '20', '--method', 'panels', '--json')
    const { certificate } = JSON.parse(out) as { certificate: { parameters: Record<string, string | number> } }
    const panels = String(certificate.parameters.panelNodes).split(',').length
    certificate.parameters.panelNodes = new Array(panels).fill(5_000).join(',')
    certificate.parameters.precision = 12_000
    const file = join(folder, 'forged.json')
    writeFileSync(file, JSON.stringify(certificate))
    const begun = Date.now()
    expect(await run('verify', file, '--minutes', '0.05')).toMatchObject({ code: 2, err: expect.stringContaining('not decided') as string })
    expect(Date.now() - begun).toBeLessThan(30_000)
    expect(await run('verify', file, '--minutes', 'ever')).toMatchObject({ code: 2 })
  })

  it('prints an array for a range of k, and a line for a person without --json', async () => {
    const { out } = await run('enclose', '--set', 'squarefree-almost-primes', '--k', '1..3', '--digits', '12', '--json')
    const answers = JSON.parse(out) as { lo: string; hi: string }[]
    // Squarefree, k = 1, 2, 3; Arb 2.23 and PARI/GP.
    const expected = ['1.636616323351260868569658003921', '0.890925479476318332137262621995', '0.713123800509890255412029279069']
    expect(answers.map((answer, i) => contains(answer, expected[i], 1))).toEqual([true, true, true])
    const person = await run('enclose', '--set', 'primes', '--coprime-to', '2', '--digits', '10')
    expect(person.out).toContain('0.9152688029…'.slice(0, 12))
    expect(person.out).toContain('p != 2')
  })

  it('takes a negative power of the logarithm after its flag', () => {
    const order = readOrder(['--set', 'primes', '--power', '2', '--log-power', '-1', '--json'], () => '')
    expect(order).toMatchObject({ json: true, definitions: [{ weight: { power: '2', logPower: '-1' } }] })
  })

  it.each<[string, string[]]>([
    ['nothing to sum', []],
    ['an unknown set', ['--set', 'evens']],
    ['an unknown flag', ['--set', 'primes', '--colour', 'red']],
    ['a flag that does not fit', ['--set', 'primes', '--y', '7']],
    ['a missing flag', ['--set', 'almost-primes']],
    ['k = 0', ['--set', 'almost-primes', '--k', '0']],
    ['k = 10^9', ['--set', 'almost-primes', '--k', '1000000000']],
    ['a range to 10^9', ['--set', 'almost-primes', '--k', '1..1000000000']],
    ['100,000 digits', ['--set', 'primes', '--digits', '100000']],
    ['an exclusion that is no prime', ['--set', 'primes', '--exclude', '2,9']],
    ['a sum that diverges', ['--set', 'integers']],
    ['a sum that diverges by its weight', ['--set', 'primes', '--log-power', '0']],
    ['two goals', ['--set', 'primes', '--digits', '5', '--cutoff', '100']],
    ['a weight that is no number', ['--set', 'primes', '--power', 'one']],
  ])('refuses %s in one line', (_name, args) => {
    const attempt = () => readOrder(args, () => expect.fail('no file is read here'))
    expect(attempt).toThrow(EngineRefusal)
    expect(attempt).toThrow(/^[^\n]+\.$/)
  })

  it.each([
    ['a sum that diverges', ['--set', 'integers']],
    ['a file that is not there', ['--set', 'finite', '--file', join(folder, 'nowhere.csv')]],
    ['more digits than the method goes to', ['--set', 'primes', '--digits', '999', '--method', 'transform']],
  ])('refuses %s with exit code 2', async (_name, args) => {
    const { code, out, err } = await run('enclose', ...args)
    expect([code, out, err.trim().split('\n').length]).toEqual([2, '', 1])
  })
})

describe('verify', () => {
  it('says what is missing', async () => {
    expect(await run('verify')).toMatchObject({ code: 2 })
    expect(await run('verify', join(folder, 'nowhere.json'))).toMatchObject({ code: 2 })
    const file = join(folder, 'nonsense.json')
    writeFileSync(file, '{"format":"merestone-certificate"}')
    expect(await run('verify', file)).toMatchObject({ code: 1 })
  })
})
