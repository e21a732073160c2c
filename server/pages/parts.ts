import katex from 'katex'
import { certifiedTruncated, groupDigits } from '../../shared/digits.ts'
import { fitsOneLine, printedParts } from '../../shared/printed-text.ts'
import type { DefinitionView } from '../../shared/schemas/definition.ts'
import { html, Html } from '../html.ts'

/** Parts that the texts of pages are put together from. They use the client's style sheet and no script. */

export const link = (to: string, words: string | Html): Html => html`<a href="${to}">${words}</a>`

export const constantLink = (number: string): Html => link(`/constants/${number}`, number)

export const claimLink = (number: string): Html => link(`/claims/${number.replace('/', '-')}`, number)

/** A date without the reader's zone, which nobody knows here. */
export function day(instant: string): Html {
  const words = new Date(instant).toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' })
  return html`<time datetime="${instant}">${words}</time>`
}

/** Plain text with its mathematics as it is printed. */
export const printed = (text: string): Html =>
  html`${printedParts(text).map(({ place, text: part }) => (place === 'line' ? part : place === 'raised' ? html`<sup>${part}</sup>` : html`<sub>${part}</sub>`))}`

const NO_BREAK = '\u00a0'

/** "3.1e-42" as it is printed. */
export function magnitude(text: string): Html {
  const [mantissa = '', exponent] = text.toLowerCase().split('e')
  return exponent === undefined || Number(exponent) === 0 ? html`${mantissa}` : html`${mantissa}${NO_BREAK}·${NO_BREAK}10<sup>${String(Number(exponent)).replace('-', '−')}</sup>`
}

/** A formula as MathML, which browsers set by themselves; KaTeX escapes its input, and without `trust` no command loads anything. */
const formula = (latex: string): Html => new Html(katex.renderToString(latex, { output: 'mathml', displayMode: true, throwOnError: false, trust: false, maxExpand: 200 }))

/** What is meant, typeset, in words and as TeX. */
export const definitionOf = ({ latex, text, aliases }: DefinitionView): Html => html`
  ${fitsOneLine(latex) && formula(latex)}
  <p>${text.charAt(0).toUpperCase()}${text.slice(1)}${aliases.length > 0 && ` (also: ${aliases.join(', ')})`}.</p>
  <p class="fine">TeX: <code>${latex}</code></p>`

/** Certified digits in groups of five, then that they go on. Gaps are made by style, so that they copy as one number. */
export function digits({ lo, hi }: { lo: string; hi: string }): Html {
  const { text } = certifiedTruncated(lo, hi)
  if (text === null) return html`<span class="digits">no certified digit</span>`
  const [integer = '', decimals] = text.split('.')
  const groups = groupDigits(decimals ?? '').map((group) => html`<span>${group}</span><wbr />`)
  return html`<span class="digits">${integer.replace('-', '−')}${decimals !== undefined && '.'}${groups}${lo !== hi && '…'}</span>`
}

export const facts = (rows: readonly (readonly [term: string, value: Html | string] | null)[]): Html =>
  html`<dl>${rows.map((row) => row && html`<div><dt>${row[0]}</dt><dd>${row[1]}</dd></div>`)}</dl>`

export interface TextColumn<Row> {
  header: string
  cell: (row: Row) => Html | string | number
}

export function table<Row>(rows: readonly Row[], columns: readonly TextColumn<Row>[]): Html {
  return html`<table class="ruled-table"><thead><tr>${columns.map(({ header }) => html`<th scope="col">${header}</th>`)}</tr></thead>
    <tbody>${rows.map((row) => html`<tr>${columns.map(({ header, cell }) => html`<td data-label="${header}"><div>${cell(row)}</div></td>`)}</tr>`)}</tbody></table>`
}

export const cite = ({ plain, bibtex }: { plain: string; bibtex: string }): Html => html`<h2>To cite it</h2><p>${plain}</p><pre>${bibtex}</pre>`

/** A whole page: the ways through the register that need no script, and the text. */
export const textPage = (main: Html): Html => html`<div class="text-page">
  <header><p>Merestone</p><nav aria-label="Main"><a href="/register">Register</a> <a href="/estimates">Estimates</a></nav></header>
  <main>${main}</main>
  <footer><p>This is the page as text. With JavaScript it also filters, draws, checks digits, and repeats certificates in your browser.</p></footer>
</div>`
