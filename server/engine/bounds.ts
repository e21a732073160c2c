import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { projectRoot } from '../project-root.ts'

let statements: Map<string, string> | undefined

/** Longest statement shown beside a number; the whole of it is in BOUNDS.md. */
const MOST_CHARACTERS = 280

/**
 * Entries of BOUNDS.md are a heading "### T-2 Trapezoid rule" and paragraphs, of which the one that begins "*Statement.*" says what the
 * bound claims. Kept is the title with the beginning of the statement, whole sentences where they fit.
 */
function read(): Map<string, string> {
  const text = readFileSync(join(projectRoot, 'shared', 'engine', 'BOUNDS.md'), 'utf8')
  const entries = text.split(/^### /m).slice(1)
  return new Map(
    entries.map((entry) => {
      const [, id, title] = /^([A-Z]{1,3}-\d+[a-z]?)[\s.:—–-]+(.+)$/m.exec(entry) ?? ['', '', '']
      const paragraph = /\n\*Statement\.\*\s+([^]*?)(?:\n\s*\n|$)/.exec(entry)?.[1].replace(/\s+/g, ' ').replaceAll('`', '').trim() ?? ''
      return [id, paragraph === '' ? title.trim() : `${title.trim()}: ${shortened(paragraph)}`]
    }),
  )
}

function shortened(paragraph: string): string {
  if (paragraph.length <= MOST_CHARACTERS) return paragraph
  const end = paragraph.lastIndexOf('. ', MOST_CHARACTERS)
  return end > 0 ? paragraph.slice(0, end + 1) : `${paragraph.slice(0, paragraph.lastIndexOf(' ', MOST_CHARACTERS))} …`
}

/** A bound in a line or two, from BOUNDS.md; its id where it has no entry. */
export function boundStatement(id: string): string {
  statements ??= read()
  return statements.get(id) ?? id
}
