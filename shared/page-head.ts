import { certifiedTruncated, intervalText, splitEnclosure } from './digits.ts'
import { PAGES, PRODUCT_DESCRIPTION, type Page, type PageName } from './pages.ts'
import { printedText } from './printed-text.ts'
import type { ClaimSummary } from './schemas/claim.ts'
import type { ConstantSummary } from './schemas/constant.ts'
import type { Estimate } from './schemas/estimate.ts'
import { STATE_WORDS } from './words.ts'

/** How one page is known: to the browser's tab, to search engines, to those it is shared with. */
export interface PageHead {
  /** What stands before the product's name. */
  title: string
  description: string
  /** The one address of what the page shows, without filters; null where it is to stand in no index. */
  canonical: string | null
}

export const UNKNOWN_PAGE: PageHead = { title: 'Not found', description: PRODUCT_DESCRIPTION, canonical: null }

/** The head of a page by its name. One that shows a thing of the register is not for an index until the thing is known. */
export function pageHead(name: PageName, title: string = PAGES[name].title): PageHead {
  const page: Page = PAGES[name]
  const listed = page.access === 'public' && !page.path.includes(':')
  return { title, description: page.description ?? PRODUCT_DESCRIPTION, canonical: listed ? (page.canonical ?? page.path) : null }
}

/** States in which a thing is in the register, where everybody can read it if its group publishes. */
const ENTERED = new Set(['signed', 'superseded', 'suspended', 'withdrawn'])

type ConstantWords = Pick<ConstantSummary, 'number' | 'definition' | 'best' | 'state' | 'group'>

export function constantHead({ number, definition, best, state, group }: ConstantWords): PageHead {
  return {
    title: `${number}: ${shortened(definition.text, 120)}`,
    description: `${sentence(shortened(definition.text, 160))} ${best ? sentence(valueWords(best)) : 'No enclosure of it is signed.'} ${group.name}: ${STATE_WORDS[state]}.`,
    canonical: ENTERED.has(state) ? `/constants/${number}` : null,
  }
}

type ClaimWords = Pick<ClaimSummary, 'number' | 'kind' | 'constant' | 'otherConstant' | 'definition' | 'enclosure' | 'state' | 'author' | 'group' | 'signedAt'>

export function claimHead(claim: ClaimWords): PageHead {
  const { number, enclosure, state, author, group, signedAt } = claim
  const what = assertionWords(claim)
  const standing = [...(signedAt === null ? [] : [`signed ${signedAt.slice(0, 10)}`]), ...(state === 'signed' ? [] : [STATE_WORDS[state]])].join(', ')
  return {
    title: `${number ?? `Draft for ${claim.constant}`}: ${shortened(what, 120)}`,
    description: `${sentence(shortened(what, 160))} ${enclosure ? `${sentence(valueWords(enclosure))} ` : ''}By ${author.name}, ${group.name}; ${standing}.`,
    canonical: number !== null && signedAt !== null ? `/claims/${number.replace('/', '-')}` : null,
  }
}

export function estimateHead({ id, title, statement, validFor, source }: Pick<Estimate, 'id' | 'title' | 'statement' | 'validFor' | 'source'>): PageHead {
  return { title: printedText(title), description: printedText(`${statement} for ${validFor}. ${source}.`), canonical: `/estimates/${id}` }
}

/** What a claim is about: its constant, or the order of two. */
export function assertionWords({ kind, constant, otherConstant, definition }: Pick<ClaimWords, 'kind' | 'constant' | 'otherConstant' | 'definition'>): string {
  return kind === 'order' && otherConstant !== null ? `${constant} is less than ${otherConstant}` : definition.text
}

/** Decimals that a description shows. */
const SHOWN = 30

/** An enclosure in a few words: digits cut off where they are certified, never a digit that is not. */
function valueWords({ lo, hi }: { lo: string; hi: string }): string {
  const { text, decimals } = certifiedTruncated(lo, hi)
  if (text === null) {
    const { lowerNext, upperNext } = splitEnclosure(lo, hi, SHOWN)
    return `In ${intervalText(lowerNext, upperNext)}`
  }
  if (lo === hi && decimals <= SHOWN) return `Exactly ${text}`
  return `${text.slice(0, text.length - Math.max(0, decimals - SHOWN))}…, certified to ${decimals} digit${decimals === 1 ? '' : 's'} after the point`
}

const sentence = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}${/[.…]$/.test(text) ? '' : '.'}`

/** A text cut at a word so that it has at most `most` characters. */
function shortened(text: string, most: number): string {
  if (text.length <= most) return text
  const cut = text.slice(0, most - 1)
  const word = cut.lastIndexOf(' ')
  return `${cut.slice(0, word > most / 2 ? word : cut.length).trimEnd()}…`
}

/** What the browser's tab says. */
export const documentTitle = ({ title }: PageHead): string => `${title} · Merestone`

export interface HeadTag {
  name: 'meta' | 'link'
  attributes: Record<string, string>
}

/** The tags of a head beside its title; `address` is the public address of the installation. */
export function headTags({ title, description, canonical }: PageHead, address: string): HeadTag[] {
  const meta = (key: 'name' | 'property', value: string, content: string): HeadTag => ({ name: 'meta', attributes: { [key]: value, content } })
  const url = canonical === null ? null : address + canonical
  return [
    meta('name', 'description', description),
    url === null ? meta('name', 'robots', 'noindex') : { name: 'link', attributes: { rel: 'canonical', href: url } },
    meta('property', 'og:site_name', 'Merestone'),
    meta('property', 'og:type', 'website'),
    meta('property', 'og:title', title),
    meta('property', 'og:description', description),
    ...(url === null ? [] : [meta('property', 'og:url', url)]),
  ]
}
