import type { z } from 'zod'
import { pageHead } from '../../shared/page-head.ts'
import type { constantQuery } from '../../shared/schemas/constant.ts'
import { STATE_WORDS } from '../../shared/words.ts'
import { html } from '../html.ts'
import { presentConstantSummary } from '../presenters/constant.ts'
import { listConstants } from '../queries/constant.ts'
import { constantLink, day, digits, link, table, textPage } from './parts.ts'
import type { PageContent } from './template.ts'

type Query = z.output<typeof constantQuery>

/** A page of the public register, filtered and sorted as the address says. */
export async function registerPage(query: Query): Promise<PageContent> {
  const { rows, next, total } = await listConstants(undefined, query)
  return {
    head: pageHead('register'),
    text: textPage(html`
      <h1>Register of constants</h1>
      <form action="/register" role="search"><label>Words, a definition, or leading digits <input name="text" type="search" value="${query.text ?? ''}" /></label> <button>Find</button></form>
      ${total !== undefined && html`<p>${total} ${total === 1 ? 'constant' : 'constants'}.</p>`}
      ${table(rows.map(presentConstantSummary), [
        { header: 'Number', cell: ({ number }) => constantLink(number) },
        { header: 'Definition', cell: ({ definition }) => definition.text },
        { header: 'Best enclosure', cell: ({ best }) => (best ? digits(best) : 'none in force') },
        { header: 'Digits', cell: ({ best }) => best?.digits.truncated ?? '' },
        { header: 'State', cell: ({ state, inConflict }) => `${STATE_WORDS[state]}${inConflict ? ', in conflict' : ''}` },
        { header: 'Group', cell: ({ group }) => group.name },
        { header: 'Changed', cell: ({ changedAt }) => day(changedAt) },
      ])}
      ${next !== null && html`<p>${link(`/register?${searchOf({ ...query, cursor: next })}`, 'Next page')}</p>`}
      <p>The whole register as ${link('/api/v1/constants/export?format=csv', 'CSV')}, ${link('/api/v1/constants/export?format=json', 'JSON')} or ${link('/api/v1/constants/export?format=bibtex', 'BibTeX')}.</p>`),
  }
}

const searchOf = (query: Query): string =>
  new URLSearchParams(Object.entries(query).flatMap(([key, value]) => (value === undefined || key === 'limit' ? [] : [[key, String(value)]]))).toString()
