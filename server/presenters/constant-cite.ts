import { certifiedTruncated, intervalText } from '../../shared/digits.ts'
import { constantNumberText } from '../../shared/constant-number.ts'
import { env } from '../env.ts'
import { bestOf } from './constant-value.ts'
import type { ConstantRow } from '../queries/constant.ts'

/** Address of a constant's page. */
export const constantAddress = (number: number): string => `${env.publicUrl}/constants/${constantNumberText(number)}`

/** What is known of the number in one line: the certified digits, and the whole interval where it is short. */
function valueText(row: ConstantRow): string {
  const best = bestOf(row)
  if (!best) return 'no signed enclosure in force'
  const { text } = certifiedTruncated(best.lo, best.hi)
  const interval = intervalText(best.lo, best.hi)
  return text === null || interval.length <= 60 ? `in ${interval}` : best.lo === best.hi ? text : `${text}…`
}

/** A sentence with its full stop, which digits that go on do not take. */
export const closed = (sentence: string): string => (sentence.endsWith('…') ? sentence : `${sentence}.`)

export const bibtexText = (text: string): string => text.replace(/[\\{}]/g, '').replace(/[&%$#_]/g, (mark) => `\\${mark}`).replaceAll('^', '\\^{}').replaceAll('…', '\\ldots{}').replaceAll('>=', '$\\ge$').replaceAll('<=', '$\\le$').replaceAll('!=', '$\\ne$')

/** How to cite a constant as it stands. The year is that of its last change, so that the entry does not move by itself. */
export function citeConstant(row: ConstantRow): { plain: string; bibtex: string } {
  const number = constantNumberText(row.number)
  const date = row.changed_at.toISOString().slice(0, 10)
  return {
    plain: `${number}: ${row.text}; ${closed(valueText(row))} Register of certified constants Merestone, ${row.group_name}, state of ${date}. ${constantAddress(row.number)}`,
    bibtex: [
      `@misc{${number},`,
      `  title        = {${number}: ${bibtexText(row.text)}},`,
      `  author       = {{${bibtexText(row.group_name)}}},`,
      `  howpublished = {Merestone, register of certified constants},`,
      `  note         = {${bibtexText(valueText(row))}; state of ${date}},`,
      `  year         = {${date.slice(0, 4)}},`,
      `  url          = {${constantAddress(row.number)}}`,
      '}',
    ].join('\n'),
  }
}
