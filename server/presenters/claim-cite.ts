import { claimNumberText, claimSlug } from '../../shared/constant-number.ts'
import { certifiedTruncated, intervalText } from '../../shared/digits.ts'
import { env } from '../env.ts'
import type { ClaimDetailRow } from '../queries/claim.ts'
import { bibtexText, closed } from './constant-cite.ts'

/** What a claim says, in one line. */
export function assertionText({ lo, hi, text, basis }: Pick<ClaimDetailRow, 'lo' | 'hi' | 'text' | 'basis'>): string {
  if (lo === null || hi === null) {
    const greater = (basis.greater as { constant?: string; text?: string } | undefined) ?? {}
    return `${text} is less than ${greater.text ?? greater.constant ?? 'another constant'}`
  }
  const interval = intervalText(lo, hi)
  const { text: digits } = certifiedTruncated(lo, hi)
  return `${text}: ${digits === null || interval.length <= 80 ? `in ${interval}` : `${digits}…`}`
}

/** What a citation says besides of a signed claim that is not in force as it stands. */
const STANDING: Partial<Record<ClaimDetailRow['state'], string>> = { suspended: ', suspended', withdrawn: ', withdrawn' }

/** How to cite a claim that was signed: by its number, which never changes, and the day of the signature. */
export function citeClaim(row: ClaimDetailRow): { plain: string; bibtex: string } | null {
  if (row.ordinal === null || row.signed_at === null) return null
  const number = claimNumberText(row.number, row.ordinal)
  const slug = claimSlug(row.number, row.ordinal)
  const address = `${env.publicUrl}/claims/${slug}`
  const date = row.signed_at.toISOString().slice(0, 10)
  const what = assertionText(row)
  const signed = `signed ${date}${STANDING[row.state] ?? ''}`
  return {
    plain: `${row.author_name}, ${number}: ${closed(what)} Register of certified constants Merestone, ${row.group_name}, ${signed}, certificate ${row.certificate_digest.slice(0, 16)}. ${address}`,
    bibtex: [
      `@misc{${slug},`,
      `  author       = {{${bibtexText(row.author_name)}}},`,
      `  title        = {${number}: ${bibtexText(what)}},`,
      `  howpublished = {Merestone, register of certified constants},`,
      `  note         = {${signed}; certificate ${row.certificate_digest}},`,
      `  year         = {${date.slice(0, 4)}},`,
      `  url          = {${address}}`,
      '}',
    ].join('\n'),
  }
}
