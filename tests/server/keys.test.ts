import { statSync } from 'node:fs'
import request from 'supertest'
import { describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { dataPath } from '../../server/data-folder.ts'
import { changeKey, isSignedHere, publicKeys, sign } from '../../server/keys.ts'
import { hasValidSignature } from '../../shared/engine/certificate/signature.ts'
import type { Certificate } from '../../shared/engine/certificate/certificate.ts'

const DIGEST = 'ab'.repeat(32)
const OTHER = 'cd'.repeat(32)

/** What a stranger does with a certificate and the PEM file of a key: the check of the engine, by Web Crypto. */
const verifiedByStranger = (digest: string, signature: ReturnType<typeof sign>, pem: string) =>
  hasValidSignature({ digest, signature } as Certificate, pem.replace(/-----[^-]+-----|\s/g, ''))

describe('the key of the installation', () => {
  it('signs what anybody can verify by the public half alone', async () => {
    const signature = sign(DIGEST)
    const [key] = publicKeys()
    expect(signature).toMatchObject({ algorithm: 'Ed25519', keyId: key?.id })
    expect(await verifiedByStranger(DIGEST, signature, key!.pem)).toBe(true)
    expect(await verifiedByStranger(OTHER, signature, key!.pem)).toBe(false)
    expect(isSignedHere(DIGEST, signature)).toBe(true)
    expect(isSignedHere(OTHER, signature)).toBe(false)
  })

  it('lies in a file that only its owner can read, and not in the database', () => {
    sign(DIGEST)
    expect(statSync(dataPath('keys', 'keyring.json')).mode & 0o777).toBe(0o600)
  })

  it('can be changed; what the earlier one signed stays verifiable', async () => {
    const before = sign(DIGEST)
    const id = changeKey()
    const after = sign(DIGEST)
    expect(after.keyId).toBe(id)
    expect(before.keyId).not.toBe(id)
    expect([before, after].map((signature) => isSignedHere(DIGEST, signature))).toEqual([true, true])
    const [current, earlier] = publicKeys()
    expect(current).toMatchObject({ id, retiredAt: null })
    expect(earlier).toMatchObject({ id: before.keyId })
    expect(earlier?.retiredAt).not.toBeNull()
    expect(await verifiedByStranger(DIGEST, before, earlier!.pem)).toBe(true)
  })

  it('is published, the public half only', async () => {
    const app = createApp()
    const { items } = (await request(app).get('/api/v1/keys').expect(200)).body
    expect(items).toEqual(publicKeys())
    expect(JSON.stringify(items)).not.toContain('PRIVATE')
    const file = await request(app).get(`/api/v1/keys/${items[0].id}.pem`).responseType('blob').expect(200)
    expect(file.body.toString()).toBe(items[0].pem)
    await request(app).get('/api/v1/keys/0000000000000000.pem').expect(404)
  })
})
