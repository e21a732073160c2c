import { createHash, createPrivateKey, createPublicKey, generateKeyPairSync, sign as signBytes, verify as verifyBytes } from 'node:crypto'
import { renameSync, writeFileSync } from 'node:fs'
import { dataPath, secretFile } from './data-folder.ts'
import type { PublicKey } from '../shared/schemas/group.ts'

/** A signature over the UTF-8 bytes of a digest, as it stands in a certificate. */
export interface Signature {
  algorithm: 'Ed25519'
  keyId: string
  /** Base64. */
  value: string
}

/** A key of the installation. The private half of a retired key is gone: it signs nothing any more, but what it signed stays verifiable. */
interface Key {
  id: string
  publicPem: string
  privatePem: string | null
  createdAt: string
  retiredAt: string | null
}

function newKey(): Key {
  const { publicKey, privateKey } = generateKeyPairSync('ed25519')
  const id = createHash('sha256').update(publicKey.export({ type: 'spki', format: 'der' })).digest('hex').slice(0, 16)
  return {
    id,
    publicPem: publicKey.export({ type: 'spki', format: 'pem' }) as string,
    privatePem: privateKey.export({ type: 'pkcs8', format: 'pem' }) as string,
    createdAt: new Date().toISOString(),
    retiredAt: null,
  }
}

const keyringPath = (): string => dataPath('keys', 'keyring.json')

/** All keys, the one in use last. Read from the file each time, so that a change of key needs no restart. */
function keyring(): Key[] {
  return JSON.parse(secretFile(keyringPath(), () => JSON.stringify([newKey()], null, 2))) as Key[]
}

/** Signs a digest (64 hexadecimal characters) with the key in use, which is made at the first call on this installation. */
export function sign(digest: string): Signature {
  const key = keyring().at(-1)
  if (!key?.privatePem) throw new Error('the keyring has no key to sign with')
  return { algorithm: 'Ed25519', keyId: key.id, value: signBytes(null, Buffer.from(digest, 'utf8'), createPrivateKey(key.privatePem)).toString('base64') }
}

/** Whether a signature over a digest was made by a key of this installation, the one in use or an earlier one. */
export function isSignedHere(digest: string, { keyId, value }: Signature): boolean {
  const key = keyring().find(({ id }) => id === keyId)
  return key !== undefined && verifyBytes(null, Buffer.from(digest, 'utf8'), createPublicKey(key.publicPem), Buffer.from(value, 'base64'))
}

/** The public halves of all keys, newest first. */
export function publicKeys(): PublicKey[] {
  return keyring()
    .map(({ id, publicPem, createdAt, retiredAt }): PublicKey => ({ id, algorithm: 'Ed25519', pem: publicPem, createdAt, retiredAt }))
    .reverse()
}

/** Takes a new key into use. The old one's private half is destroyed, its public half kept. Answers the new key's id. */
export function changeKey(): string {
  const now = new Date().toISOString()
  const retired = keyring().map((key): Key => ({ ...key, privatePem: null, retiredAt: key.retiredAt ?? now }))
  const key = newKey()
  const draft = `${keyringPath()}.${process.pid}`
  writeFileSync(draft, JSON.stringify([...retired, key], null, 2), { mode: 0o600 })
  renameSync(draft, keyringPath())
  return key.id
}
