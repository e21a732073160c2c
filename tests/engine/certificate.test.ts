import { generateKeyPairSync, sign } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { canonicalJson, sha256Hex } from '../../shared/engine/certificate/canonical-json.ts'
import { type Certificate, certificateDigest, isIntact, makeCertificate } from '../../shared/engine/certificate/certificate.ts'
import { repeatCertificate } from '../../shared/engine/certificate/repeat.ts'
import { hasValidSignature, signedBytes } from '../../shared/engine/certificate/signature.ts'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { Json } from '../../shared/engine/methods/computation.ts'
import { canonicalDefinition } from '../../shared/engine/sets/canonical.ts'
import { readCertificate } from '../../shared/schemas/certificate.ts'

const ENGINE = { version: '0.0.1', digest: 'ab'.repeat(32) }

async function sample(): Promise<Certificate> {
  const definition = canonicalDefinition({ type: 'series', set: { kind: 'almost-primes', k: 2, exclude: [2] }, weight: { power: '1', logPower: '1' } })
  const [outcome] = await computeAll(await prepare({ definitions: [definition], method: 'transform', arithmetic: 'ball', goal: { digits: 8 } }))
  return makeCertificate(outcome, ENGINE)
}

describe('canonical JSON (RFC 8785)', () => {
  it('writes the example of section 3.2.2 as section 3.2.4 does', () => {
    const value = JSON.parse(
      '{"numbers":[333333333.33333329,1E30,4.50,2e-3,0.000000000000000000000000001],"string":"\\u20ac$\\u000F\\u000aA\'\\u0042\\u0022\\u005c\\\\\\"\\/","literals":[null,true,false]}',
    ) as Json
    expect(canonicalJson(value)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    )
  })

  it('sorts names by UTF-16 code units, as in section 3.2.3', () => {
    const names = { '\u20ac': 1, '\r': 2, '\ufb33': 3, '1': 4, '\ud83d\ude00': 5, '\u0080': 6, '\u00f6': 7 }
    expect(canonicalJson(names)).toBe('{"\\r":2,"1":4,"\u0080":6,"\u00f6":7,"\u20ac":1,"\ud83d\ude00":5,"\ufb33":3}')
  })

  it('has the digest that FIPS 180-2 gives for "abc"', async () => {
    expect(await sha256Hex('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad')
  })
})

describe('a certificate', () => {
  it('repeats from its text alone', async () => {
    const certificate = await sample()
    const read = readCertificate(JSON.stringify(certificate, null, 2))
    if (!('certificate' in read)) return expect.fail(read.problem)
    const shares: number[] = []
    const repetition = await repeatCertificate(read.certificate, (share) => shares.push(share))
    expect(repetition).toMatchObject({ intact: true, repeats: true, findings: [] })
    expect(shares.at(-1)).toBe(1)
  })

  it('is told apart when one digit is changed, also by someone who makes the digest anew', async () => {
    const certificate = await sample()
    const changed: Certificate = { ...certificate, enclosure: { ...certificate.enclosure, lo: certificate.enclosure.lo.replace(/\d$/, (d) => String((Number(d) + 1) % 10)) } }
    expect(await repeatCertificate(changed)).toMatchObject({ intact: false, repeats: false })
    const forged = { ...changed, digest: await certificateDigest(changed) }
    const repetition = await repeatCertificate(forged)
    expect(repetition).toMatchObject({ intact: true, repeats: false })
    expect(repetition.findings[0]).toContain('comes out as')
  })

  it.each<[string, (c: Certificate) => unknown]>([
    ['another parameter', (c) => ({ ...c, parameters: { ...c.parameters, precision: 90 } })],
    ['another definition', (c) => ({ ...c, definition: { ...c.definition, set: { kind: 'almost-primes', k: 3, exclude: [2] } } })],
    ['a parameter that nobody knows', (c) => ({ ...c, parameters: { ...c.parameters, without: 'theta-dusart-2018' } })],
    ['a parameter written otherwise', (c) => ({ ...c, parameters: { ...c.parameters, step: `0${String(c.parameters.step)}` } })],
    ['a definition that is not canonical', (c) => ({ ...c, definition: { ...c.definition, set: { kind: 'almost-primes', k: 1, exclude: [2] } } })],
    ['an unsound parameter', (c) => ({ ...c, parameters: { ...c.parameters, step: '0' } })],
    ['more digits than certified', (c) => ({ ...c, digits: { truncated: 40, rounded: 40 } })],
    ['a smaller budget', (c) => ({ ...c, budget: c.budget.slice(1) })],
  ])('with %s does not repeat, though its digest be made anew', async (_name, change) => {
    const changed = change(await sample()) as Certificate
    const repetition = await repeatCertificate({ ...changed, digest: await certificateDigest(changed) })
    expect(repetition).toMatchObject({ intact: true, repeats: false })
    expect(repetition.findings.length).toBeGreaterThan(0)
  })

  it('carries a signature that only the key and the digest make', async () => {
    const certificate = await sample()
    const [mine, other] = [generateKeyPairSync('ed25519'), generateKeyPairSync('ed25519')]
    const pem = (pair: typeof mine) => pair.publicKey.export({ type: 'spki', format: 'pem' }).toString()
    const value = sign(null, signedBytes(certificate.digest), mine.privateKey).toString('base64')
    const signed: Certificate = { ...certificate, signature: { algorithm: 'Ed25519', keyId: 'test', value } }
    expect(await isIntact(signed)).toBe(true)
    expect(await hasValidSignature(signed, pem(mine))).toBe(true)
    expect(await hasValidSignature(signed, pem(other))).toBe(false)
    expect(await hasValidSignature({ ...signed, digest: 'cd'.repeat(32) }, pem(mine))).toBe(false)
    expect(await hasValidSignature(signed, 'no key')).toBe(false)
    expect(await hasValidSignature(certificate, pem(mine))).toBe(false)
    expect('certificate' in readCertificate(JSON.stringify(signed))).toBe(true)
  })

  it.each(['', '[]', '{"format":"something-else"}', '{"a":'])('is not read from %j', (text) => {
    expect(readCertificate(text)).toHaveProperty('problem')
  })
})
