import type { Page } from 'playwright-core'
import { beforeAll, describe, expect, it } from 'vitest'
import '../support/test-database.ts'
import { readEngineRelease } from '../../server/engine-release.ts'
import { makeCertificate, type Certificate, type EngineRelease } from '../../shared/engine/certificate/certificate.ts'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { ComputationRequest } from '../../shared/engine/methods/computation.ts'
import type { Definition } from '../../shared/engine/sets/definition.ts'
import { openWindow, startInstallation } from './installation.ts'

const over = (set: Extract<Definition, { type: 'series' }>['set']): Definition => ({ type: 'series', set, weight: { power: '1', logPower: '1' } })

/** One case a way of computing: both transforms by both arithmetics, and a partial sum that cites estimates. */
const CASES: [name: string, request: ComputationRequest][] = [
  ['the trapezoid by ball', { definitions: [over({ kind: 'almost-primes', k: 3, exclude: [] })], method: 'transform', arithmetic: 'ball', goal: { digits: 20 } }],
  ['the trapezoid by mpfr', { definitions: [over({ kind: 'almost-primes', k: 2, exclude: [2] })], method: 'transform', arithmetic: 'mpfr', goal: { digits: 12 } }],
  ['panels by ball', { definitions: [over({ kind: 'primes', exclude: [] })], method: 'panels', arithmetic: 'ball', goal: { digits: 30 } }],
  ['panels by mpfr', { definitions: [over({ kind: 'squarefree-almost-primes', k: 2, exclude: [] })], method: 'panels', arithmetic: 'mpfr', goal: { digits: 12 } }],
  ['a partial sum', { definitions: [over({ kind: 'primes', exclude: [] })], method: 'partial-sum', arithmetic: 'ball', goal: { cutoff: '1000000' } }],
]

describe('a certificate made by Node repeats in a browser', () => {
  const troubles: string[] = []
  let reader: Page
  /** Read once: the certificates of one run of the tests come from one release. */
  let release: EngineRelease

  beforeAll(async () => {
    reader = await openWindow(await startInstallation(), troubles)
    release = readEngineRelease()
    await reader.goto('/verify')
  })

  async function certify(request: ComputationRequest): Promise<Certificate> {
    const [outcome] = await computeAll(await prepare(request))
    return makeCertificate(outcome!, release)
  }

  async function repeat(name: string, certificate: Certificate): Promise<string> {
    await reader.locator('input[type=file]').setInputFiles({ name: `${name}.json`, mimeType: 'application/json', buffer: Buffer.from(JSON.stringify(certificate)) })
    await reader.getByRole('heading', { name: `${name}.json` }).waitFor()
    await reader.getByRole('button', { name: 'Repeat it in this browser' }).click()
    const verdict = reader.getByText(/^(It repeats\.|It does not repeat\.|The enclosure repeats, but the file was changed\.|The repetition broke off\.)$/)
    await verdict.waitFor({ timeout: 90_000 })
    return verdict.innerText()
  }

  it.each(CASES)('%s, to the last digit', async (name, request) => {
    expect(await repeat(name, await certify(request))).toBe('It repeats.')
  })

  it('and one with a changed digit does not', async () => {
    const certificate = await certify(CASES[0]![1])
    const { lo, hi } = certificate.enclosure
    expect(await repeat('changed', { ...certificate, enclosure: { lo, hi: hi.replace(/.$/, (digit) => String((Number(digit) + 1) % 10)) } })).toBe('It does not repeat.')
    await reader.getByText('The content is not what the digest was made of').waitFor()
  })

  it('and nothing broke on the page', () => {
    expect(troubles).toEqual([])
  })
})
