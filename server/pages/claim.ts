import { claimSlug, parseClaimNumber } from '../../shared/constant-number.ts'
import { claimHead } from '../../shared/page-head.ts'
import type { Claim } from '../../shared/schemas/claim.ts'
import { cautionWords, CONFLICT_UNSEEN, digitsWords, KIND_WORDS, METHOD_WORDS, pastWords, SOURCE_WORDS, STATE_WORDS } from '../../shared/words.ts'
import { html, type Html } from '../html.ts'
import { cite, claimLink, constantLink, day, definitionOf, digits, facts, link, magnitude, printed, table, textPage } from './parts.ts'
import type { PageContent } from './template.ts'

/** The page of a claim, as everybody may read it. */
export const claimPage = (claim: Claim): PageContent => ({
  head: claimHead(claim),
  text: textPage(html`
    <p>${constantLink(claim.constant)}, ${claim.definition.text}</p>
    <h1>${claim.number}</h1>
    <p>State: <strong>${STATE_WORDS[claim.state]}</strong>${claim.inConflict && ', in conflict'}.</p>
    <div class="entry">${subject(claim)}</div>
    ${notices(claim)}
    ${claim.remark !== '' && html`<h2>Remark of the author</h2><p class="as-written">${claim.remark}</p>`}
    <h2>Provenance</h2>${provenance(claim)}
    ${certificate(claim)}
    ${claim.outcome && grounds(claim.outcome)}
    ${claim.rechecks.length > 0 && html`<h2>Rechecks</h2>${rechecks(claim.rechecks)}`}
    ${claim.evidence.length > 0 && html`<h2>Evidence</h2><ul>${claim.evidence.map(({ id, name, digest }) => html`<li>${link(`/api/v1/evidence/${id}`, name)}, SHA-256 <code>${digest}</code></li>`)}</ul>`}
    <h2>History</h2>
    <ol>${claim.history.map(({ at, actor, act, reason }) => html`<li>${day(at)}: ${actor} ${pastWords(act)}${reason && html`, <span class="as-written">${reason}</span>`}</li>`)}</ol>
    ${claim.cite && cite(claim.cite)}
    <p class="caution">${cautionWords(claim)}</p>`),
})

const ends = ({ lo, hi }: { lo: string; hi: string }): Html => facts([['Lower end', html`<span class="number">${lo}</span>`], ['Upper end', html`<span class="number">${hi}</span>`]])

function subject(claim: Claim): Html {
  const { order, enclosure, definition } = claim
  if (order)
    return html`${[order.lesser, order.greater].map((side, index) => html`<p>${index === 1 && 'is less than '}${constantLink(side.constant)}, ${side.text}</p><p>${digits(side.enclosure)}</p>${ends(side.enclosure)}`)}`
  return html`${definitionOf(definition)}${enclosure && html`<p>${digits(enclosure)}</p>${ends(enclosure)}`}<p>${digitsWords(claim)}</p>`
}

function notices(claim: Claim): Html {
  const open = claim.conflicts.filter(({ closedAt }) => closedAt === null)
  const fallen = claim.state === 'suspended' || claim.state === 'withdrawn'
  const elsewhere = claim.statedValue ? `, printed there as ${claim.statedValue.digits} (${claim.statedValue.reading})` : ''
  return html`
    ${open.map((conflict) => html`<p><strong>In conflict.</strong> No number lies in both this enclosure and that of ${claimLink(conflict.claim)}. At least one is wrong.</p>`)}
    ${claim.inConflict && open.length === 0 && html`<p><strong>In conflict.</strong> ${CONFLICT_UNSEEN}</p>`}
    ${claim.kind === 'stated' && !claim.repeatedHere && html`<p><strong>Not repeated here.</strong> The value is taken from its source${elsewhere}. No run of this installation meets it yet.</p>`}
    ${claim.supersededBy !== null && html`<p><strong>Superseded.</strong> ${claimLink(claim.supersededBy)} is narrower. This one stays citable.</p>`}
    ${claim.doubts.map(({ estimate, title, group, at, reason }) => html`<p><strong>In doubt.</strong> It rests on ${link(`/estimates/${estimate}`, printed(title))}, which ${group.name} has in doubt since ${day(at)}: <span class="as-written">${reason}</span></p>`)}
    ${fallen && html`<p><strong>${claim.state === 'suspended' ? 'Suspended' : 'Withdrawn'}.</strong> ${claim.history.findLast(({ to }) => to === claim.state)?.reason ?? 'Don’t rest anything on it.'}</p>`}`
}

const provenance = ({ author, group, kind, run, source, supersedes, signature }: Claim): Html =>
  facts([
    ['Author', author.name],
    ['Group', group.name],
    ['Kind', KIND_WORDS[kind]],
    run && ['Method', METHOD_WORDS[run.method]],
    run && ['Arithmetic', run.arithmetic],
    source === null ? null : ['Source', source],
    supersedes === null ? null : ['Supersedes', claimLink(supersedes)],
    signature && ['Signed by', signature.by],
    signature && ['Signed', day(signature.at)],
  ])

function certificate({ id, number, certificate: made }: Claim): Html | null {
  if (!made) return null
  const name = parseClaimNumber(number ?? '')
  const reference = name ? claimSlug(name.number, name.ordinal) : id
  return html`<h2>Certificate</h2>
    <p>${link(`/api/v1/claims/${reference}/certificate`, 'Download the certificate')}${made.signed && `, signed with the key ${made.keyId ?? ''} of this installation`}. SHA-256 <code>${made.digest}</code></p>`
}

function grounds({ budget, radius, estimates, parameters }: NonNullable<Claim['outcome']>): Html {
  return html`<h2>Error budget</h2>
    ${table(budget, [
      { header: 'Source', cell: ({ source }) => SOURCE_WORDS[source] },
      { header: 'At most', cell: (item) => magnitude(item.magnitude) },
      { header: 'Bound', cell: ({ bound }) => html`<code>${bound}</code>` },
      { header: 'What the bound says', cell: ({ statement }) => printed(statement) },
    ])}
    <p>Radius, half the width of the enclosure: at most ${magnitude(radius)}.</p>
    <h2>Estimates used</h2>
    ${estimates.length === 0
      ? html`<p>No published estimate was used: every bound is proven with the engine, and the budget above names each.</p>`
      : table(estimates, [
          { header: 'Estimate', cell: ({ id, title }) => link(`/estimates/${id}`, printed(title)) },
          { header: 'Used at', cell: ({ usedAt }) => printed(usedAt) },
          { header: 'Holds for', cell: ({ validFor }) => printed(validFor) },
          { header: 'Rests on a conjecture', cell: ({ conditional }) => (conditional ? 'conditional' : 'no') },
        ])}
    <h2>Parameters</h2>${facts(Object.entries(parameters).map(([name, value]) => [name, printed(String(value).replaceAll(',', ', '))]))}`
}

const rechecks = (made: Claim['rechecks']): Html =>
  table(made, [
    { header: 'Method', cell: ({ method, arithmetic }) => `${METHOD_WORDS[method]}, ${arithmetic}` },
    { header: 'Digits', cell: ({ enclosure }) => (enclosure ? digits(enclosure) : '') },
    { header: 'Verdict', cell: ({ verdict }) => (verdict === 'meets' ? 'they meet' : verdict === 'disjoint' ? 'no number in common' : '') },
  ])
