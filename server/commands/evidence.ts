import { createHash } from 'node:crypto'
import { LIMITS } from '../../shared/limits.ts'
import { conflict, notFound, unsupportedType } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { Evidence } from '../models/evidence.ts'
import { actOnClaim } from './claim-act.ts'
import { cleanName, evidenceType } from './evidence-type.ts'

/** Keeps a file in support of a claim. Its type is told from the content; from the first submission on it stays for good. */
export async function attachEvidence(member: SignedInMember, claimId: string, { name: given, content }: { name: string; content: Buffer }): Promise<string> {
  const name = cleanName(given)
  const type = evidenceType(content, name)
  if (!type.ok) throw unsupportedType(type.reason)
  const digest = createHash('sha256').update(content).digest('hex')
  let id = ''
  await actOnClaim(member, claimId, 'attach', {}, async ({ transaction, claim }) => {
    const known = await Evidence.findAll({ where: { claimId: claim.id }, attributes: ['name', 'digest'], transaction })
    const same = known.find((file) => file.digest === digest)
    if (same) throw conflict('evidence_known', `This very file is there already, as “${same.name}”.`)
    if (known.length >= LIMITS.evidencePerClaim) throw conflict('evidence_full', `A claim has at most ${LIMITS.evidencePerClaim} files. Put several into one archive.`)
    const file = await Evidence.create({ claimId: claim.id, name, mediaType: type.mediaType, bytes: content.length, digest, content, uploadedBy: member.id }, { transaction })
    id = file.id
    return { detail: { evidence: id, name, bytes: content.length, sha256: digest } }
  })
  return id
}

/** Removes a file from a draft. */
export async function removeEvidence(member: SignedInMember, id: string): Promise<void> {
  const found = await Evidence.findByPk(id, { attributes: ['claimId'] })
  if (!found) throw notFound('file')
  await actOnClaim(member, found.claimId, 'detach', {}, async ({ transaction }) => {
    const file = await Evidence.findByPk(id, { attributes: ['id', 'name', 'digest'], transaction, lock: true })
    if (!file) throw notFound('file')
    await file.destroy({ transaction })
    return { detail: { evidence: id, name: file.name, sha256: file.digest } }
  })
}
