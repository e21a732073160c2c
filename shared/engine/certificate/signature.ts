import type { Certificate } from './certificate.ts'

/** What the Ed25519 key signs: the digest's text. */
export function signedBytes(digest: string): Uint8Array<ArrayBuffer> {
  return new TextEncoder().encode(digest)
}

/**
 * Whether the signature is this public key's over the certificate's digest. `publicKey` is the base64 of the key in DER (SPKI),
 * the body of a PEM file "PUBLIC KEY". Says nothing of the content: see `isIntact`. False where there is no signature.
 */
export async function hasValidSignature(certificate: Certificate, publicKey: string): Promise<boolean> {
  const { signature, digest } = certificate
  if (!signature || signature.algorithm !== 'Ed25519') return false
  try {
    const key = await globalThis.crypto.subtle.importKey('spki', bytesOfBase64(publicKey), { name: 'Ed25519' }, false, ['verify'])
    return await globalThis.crypto.subtle.verify({ name: 'Ed25519' }, key, bytesOfBase64(signature.value), signedBytes(digest))
  } catch {
    // A key or a signature that cannot be read proves nothing.
    return false
  }
}

function bytesOfBase64(text: string): Uint8Array<ArrayBuffer> {
  return Uint8Array.from(atob(text.replace(/-----[A-Z ]+-----|\s/g, '')), (character) => character.charCodeAt(0))
}
