import { readFileSync, statSync } from 'node:fs'
import { documentTitle, headTags, type PageHead } from '../../shared/page-head.ts'
import { env } from '../env.ts'
import { html, Html } from '../html.ts'

/** What is put into the client's page: how the page is known, and its text for whoever reads it without JavaScript. */
export interface PageContent {
  head: PageHead
  text?: Html
}

/** The places of the client's index.html that the server fills. */
const ADDRESS = 'data-address=""'
const HEAD = /<!--head-->[^]*?<!--\/head-->/
const TEXT = /<!--text-->[^]*?<!--\/text-->/

const tagOf = ({ name, attributes }: ReturnType<typeof headTags>[number]): Html =>
  html`<${new Html(name)} ${Object.entries(attributes).map(([key, value]) => html`${key}="${value}" `)}data-page />`

/** Fills the client's page, as it was built, for one address. */
export class PageTemplate {
  private readonly file: string
  private source = ''
  private readAt = -1

  constructor(file: string) {
    this.file = file
  }

  /** The page, or undefined where no client is built. A new build is taken up while the server runs. */
  fill({ head, text }: PageContent): string | undefined {
    const changed = statSync(this.file, { throwIfNoEntry: false })?.mtimeMs
    if (changed === undefined) return undefined
    if (changed !== this.readAt) this.source = readFileSync(this.file, 'utf8')
    this.readAt = changed
    const tags = html`<title>${documentTitle(head)}</title>${headTags(head, env.publicUrl).map((tag) => html`${tagOf(tag)}`)}`
    // Replaced by functions, since a text may hold what String.replace reads as a pattern.
    const filled = this.source.replace(ADDRESS, () => html`data-address="${env.publicUrl}"`.text).replace(HEAD, () => tags.text)
    return text ? filled.replace(TEXT, () => text.text) : filled
  }
}
