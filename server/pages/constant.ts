import { constantHead } from '../../shared/page-head.ts'
import type { Constant } from '../../shared/schemas/constant.ts'
import { CONFLICT_UNSEEN, STATE_WORDS } from '../../shared/words.ts'
import { html } from '../html.ts'
import { cite, claimLink, day, definitionOf, digits, facts, link, printed, table, textPage } from './parts.ts'
import type { PageContent } from './template.ts'

/** The page of a constant, as everybody may read it. */
export const constantPage = (constant: Constant): PageContent => ({
  head: constantHead(constant),
  text: textPage(html`
    <h1>${constant.number}</h1>
    <p>State: <strong>${STATE_WORDS[constant.state]}</strong>${constant.inConflict && ', in conflict'}.</p>
    <div class="entry">
      ${definitionOf(constant.definition)}
      ${constant.best
        ? html`<p>${digits(constant.best)}</p>
          ${facts([
            ['Lower end', html`<span class="number">${constant.best.lo}</span>`],
            ['Upper end', html`<span class="number">${constant.best.hi}</span>`],
            ['Certified', `${constant.best.digits.truncated} digits after the point when truncated, ${constant.best.digits.rounded} when rounded`],
          ])}`
        : html`<p>No signed enclosure of it is in force.</p>`}
    </div>
    ${constant.inConflict && constant.conflicts.every(({ closedAt }) => closedAt !== null) && html`<p><strong>In conflict.</strong> ${CONFLICT_UNSEEN}</p>`}
    <h2>Claims</h2>
    ${table(constant.claims, [
      { header: 'Claim', cell: ({ number }) => (number === null ? '' : claimLink(number)) },
      { header: 'Digits', cell: ({ enclosure, kind }) => (enclosure ? digits(enclosure) : kind === 'order' ? 'an order' : '') },
      { header: 'State', cell: ({ state }) => STATE_WORDS[state] },
      { header: 'Author', cell: ({ author, group }) => `${author.name}, ${group.name}` },
      { header: 'Signed', cell: ({ signedAt }) => (signedAt === null ? '' : day(signedAt)) },
    ])}
    <h2>Convergence and members</h2>
    <p>${printed(constant.convergence)}</p>
    ${constant.firstMembers.length > 0 && html`<p>The set begins with ${constant.firstMembers.join(', ')}, …</p>`}
    <h2>Rests on</h2>
    ${constant.restsOn.length === 0
      ? html`<p>${constant.best ? 'No published estimate: every bound is proven in the engine.' : 'Nothing yet.'}</p>`
      : html`<ul>${constant.restsOn.map(({ estimate, title, conditional }) => html`<li>${link(`/estimates/${estimate}`, printed(title))}${conditional && ' (conditional)'}</li>`)}</ul>`}
    ${constant.usedBy.length > 0 && html`<h2>Used by</h2><ul>${constant.usedBy.map(({ claimNumber, text }) => html`<li>${claimLink(claimNumber)}: ${text}</li>`)}</ul>`}
    ${cite(constant.cite)}`),
})
