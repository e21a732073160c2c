const ENTITIES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }

/** Text made safe for HTML, in content and in quoted attributes. */
export const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (character) => ENTITIES[character] ?? character)

/** HTML that is safe to send: made by the `html` template, or by a library that escapes. */
export class Html {
  readonly text: string
  constructor(text: string) {
    this.text = text
  }
}

type Piece = Html | string | number | null | false | readonly Piece[]

const written = (piece: Piece): string => {
  if (piece === null || piece === false) return ''
  if (piece instanceof Html) return piece.text
  return typeof piece === 'object' ? piece.map(written).join('') : escapeHtml(String(piece))
}

/** Writes HTML: what is put in is escaped unless it is HTML already; lists are joined, null and false left out. */
export const html = (parts: TemplateStringsArray, ...pieces: Piece[]): Html => new Html(String.raw({ raw: parts }, ...pieces.map(written)))
