import { isIntact } from '../../../../shared/engine/certificate/certificate.ts'
import type { Certificate } from '../../../../shared/engine/certificate/certificate.ts'
import { hasValidSignature } from '../../../../shared/engine/certificate/signature.ts'
import type { PublicKey } from '../../../../shared/schemas/group.ts'

/** What the signature of a certificate says. */
export type SignatureVerdict =
  | { status: 'unsigned' }
  | { status: 'valid'; key: PublicKey }
  | { status: 'invalid'; keyId: string }
  /** Signed with a key that is none of this installation's. */
  | { status: 'unknown-key'; keyId: string }
  /** This browser can't check Ed25519 signatures, or not over this connection. */
  | { status: 'unable'; keyId: string }

/** Checks the digest against the content; null where this browser can't. */
export async function checkDigest(certificate: Certificate): Promise<boolean | null> {
  return (globalThis.crypto as Crypto | undefined)?.subtle ? isIntact(certificate) : null
}

/** Checks the signature against the keys of the installation. */
export async function checkSignature(certificate: Certificate, keys: PublicKey[]): Promise<SignatureVerdict> {
  const { signature } = certificate
  if (!signature) return { status: 'unsigned' }
  const key = keys.find(({ id }) => id === signature.keyId)
  if (!key) return { status: 'unknown-key', keyId: signature.keyId }
  if (!(await readsEd25519(key.pem))) return { status: 'unable', keyId: key.id }
  return (await hasValidSignature(certificate, key.pem)) ? { status: 'valid', key } : { status: 'invalid', keyId: key.id }
}

/** Whether the browser takes this public key at all, so that an old browser is not taken for a wrong signature. */
async function readsEd25519(pem: string): Promise<boolean> {
  try {
    const der = Uint8Array.from(atob(pem.replace(/-----[A-Z ]+-----|\s/g, '')), (character) => character.charCodeAt(0))
    await globalThis.crypto.subtle.importKey('spki', der, { name: 'Ed25519' }, false, ['verify'])
    return true
  } catch {
    return false
  }
}
