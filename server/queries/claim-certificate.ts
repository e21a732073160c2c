import { createHash } from 'node:crypto'
import { claimSlug } from '../../shared/constant-number.ts'
import { selectOne } from '../db.ts'
import type { ClaimDetailRow } from './claim.ts'

/** A claim's certificate to the letter, with the name it is downloaded under. The tag changes with the signature, which the digest does not cover. */
export async function certificateOf(claim: Pick<ClaimDetailRow, 'id' | 'number' | 'ordinal'>): Promise<{ text: string; etag: string; name: string }> {
  const row = await selectOne<{ certificate: string }>('SELECT certificate FROM claims WHERE id = $id', { id: claim.id })
  const text = row?.certificate ?? ''
  const etag = `"${createHash('sha256').update(text).digest('hex')}"`
  return { text, etag, name: claim.ordinal === null ? `draft-${claim.id}` : claimSlug(claim.number, claim.ordinal) }
}
