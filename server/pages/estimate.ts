import { ESTIMATES, estimateById } from '../../shared/engine/estimates/library.ts'
import { estimateHead, pageHead } from '../../shared/page-head.ts'
import type { Estimate } from '../../shared/schemas/estimate.ts'
import { notFound } from '../errors.ts'
import { html } from '../html.ts'
import { presentEstimate } from '../presenters/estimate.ts'
import { usesOfEstimates } from '../queries/estimate.ts'
import { doubtsOfEstimates } from '../queries/estimate-doubt.ts'
import { claimLink, day, link, printed, table, textPage } from './parts.ts'
import type { PageContent } from './template.ts'

const condition = ({ conditional, condition: on }: Pick<Estimate, 'conditional' | 'condition'>): string => (conditional ? `if ${on ?? 'an unproved hypothesis holds'}` : 'unconditionally')

/** The library is always the same. Source and uses of each estimate stand on its own page. */
const LIBRARY = table(ESTIMATES, [
  { header: 'Estimate', cell: ({ id, title }) => link(`/estimates/${id}`, printed(title)) },
  { header: 'Statement', cell: ({ statement }) => printed(statement) },
  { header: 'Holds for', cell: (estimate) => html`${printed(estimate.validFor)}, ${condition(estimate)}` },
])

/** The library of estimates, and which of them are in doubt. */
export async function estimatesPage(): Promise<PageContent> {
  const doubts = await doubtsOfEstimates(undefined, ESTIMATES.map(({ id }) => id))
  const inDoubt = ESTIMATES.filter(({ id }) => doubts.some(({ estimate, lifted_at: lifted }) => estimate === id && lifted === null))
  return {
    head: pageHead('estimates'),
    text: textPage(html`
      <h1>Estimates</h1>
      <p>Published explicit inequalities that bound what a sum leaves out. A certificate names each one that it uses and where; where one falls, what rests on it falls with it.</p>
      ${inDoubt.length > 0 && html`<p><strong>In doubt</strong> at present:</p><ul>${inDoubt.map(({ id, title }) => html`<li>${link(`/estimates/${id}`, printed(title))}</li>`)}</ul>`}
      ${LIBRARY}`),
  }
}

/** One estimate with the public claims that rest on it. */
export async function estimatePage(id: string): Promise<PageContent> {
  const entry = estimateById(id)
  if (!entry) throw notFound('estimate')
  const estimate = presentEstimate(entry, await usesOfEstimates(undefined, [entry.id], 500), await doubtsOfEstimates(undefined, [entry.id]), undefined)
  return {
    head: estimateHead(estimate),
    text: textPage(html`
      <p>${link('/estimates', 'Estimates')}</p>
      <h1>${printed(estimate.title)}</h1>
      <p class="entry">${printed(estimate.statement)}<br />for ${printed(estimate.validFor)}, ${condition(estimate)}.</p>
      ${estimate.doubts.filter(({ lifted }) => lifted === null).map(({ group, at, reason }) => html`<p><strong>In doubt</strong> at ${group.name} since ${day(at)}: <span class="as-written">${reason}</span></p>`)}
      <h2>Source</h2><p>${printed(estimate.source)}.</p>
      <h2>What was checked</h2><p>${printed(estimate.checked)}</p>
      <h2>Signed claims that rest on it</h2>
      ${estimate.usedBy.length === 0
        ? html`<p>No claim in force rests on it.</p>`
        : html`<ul>${estimate.usedBy.map(({ claimNumber, usedAt }) => html`<li>${claimLink(claimNumber)}, used at ${printed(usedAt)}</li>`)}</ul>`}`),
  }
}
