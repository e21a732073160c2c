import { ESTIMATES, estimateById } from '../../shared/engine/estimates/library.ts'
import { estimateHead, pageHead } from '../../shared/page-head.ts'
import { printedText } from '../../shared/printed-text.ts'
import type { Estimate } from '../../shared/schemas/estimate.ts'
import { notFound } from '../errors.ts'
import { html } from '../html.ts'
import { presentEstimate } from '../presenters/estimate.ts'
import { usesOfEstimates } from '../queries/estimate.ts'
import { claimLink, link, table, textPage } from './parts.ts'
import type { PageContent } from './template.ts'

const condition = ({ conditional, condition: on }: Pick<Estimate, 'conditional' | 'condition'>): string => (conditional ? `if ${on ?? 'an unproved hypothesis holds'}` : 'unconditionally')

/** The library of estimates. Which claims use each stands on its own page. */
export const estimatesPage = (): PageContent => ({
  head: pageHead('estimates'),
  text: textPage(html`
    <h1>Estimates</h1>
    <p>Published explicit inequalities that bound what a sum leaves out. A certificate names each one that it uses and where; where one falls, what rests on it falls with it.</p>
    ${table(ESTIMATES, [
      { header: 'Estimate', cell: ({ id, title }) => link(`/estimates/${id}`, printedText(title)) },
      { header: 'Statement', cell: ({ statement }) => printedText(statement) },
      { header: 'Holds for', cell: (estimate) => `${printedText(estimate.validFor)}, ${condition(estimate)}` },
      { header: 'Source', cell: ({ source }) => printedText(source) },
    ])}`),
})

/** One estimate with the public claims that rest on it. */
export async function estimatePage(id: string): Promise<PageContent> {
  const entry = estimateById(id)
  if (!entry) throw notFound('estimate')
  const estimate = presentEstimate(entry, await usesOfEstimates(undefined, [entry.id], 500))
  return {
    head: estimateHead(estimate),
    text: textPage(html`
      <p>${link('/estimates', 'Estimates')}</p>
      <h1>${printedText(estimate.title)}</h1>
      <p class="entry">${printedText(estimate.statement)}<br />for ${printedText(estimate.validFor)}, ${condition(estimate)}.</p>
      <h2>Source</h2><p>${printedText(estimate.source)}.</p>
      <h2>What was checked</h2><p>${printedText(estimate.checked)}</p>
      <h2>Signed claims that rest on it</h2>
      ${estimate.usedBy.length === 0
        ? html`<p>No signed claim uses it yet.</p>`
        : html`<ul>${estimate.usedBy.map(({ claimNumber, usedAt }) => html`<li>${claimLink(claimNumber)}, used at ${printedText(usedAt)}</li>`)}</ul>`}`),
  }
}
