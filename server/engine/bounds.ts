import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { projectRoot } from '../project-root.ts'

interface BoundText {
  title: string
  /** What the bound claims; empty where the entry is a title alone. */
  statement: string
}

let texts: Map<string, BoundText> | undefined

/**
 * Entries of BOUNDS.md are a heading "### T-2 Trapezoid rule" and paragraphs, of which the one that begins "*Statement.*" says what the
 * bound claims. A statement is never cut: its conditions come first and would be read as the whole.
 */
function read(): Map<string, BoundText> {
  const text = readFileSync(join(projectRoot, 'shared', 'engine', 'BOUNDS.md'), 'utf8')
  const entries = text.split(/^### /m).slice(1)
  return new Map(
    entries.map((entry) => {
      const [, id, title] = /^([A-Z]{1,3}-\d+[a-z]?)[\s.:—–-]+(.+)$/m.exec(entry) ?? ['', '', '']
      const statement = /\n\*Statement\.\*\s+([^]*?)(?:\n\s*\n|$)/.exec(entry)?.[1].replace(/\s+/g, ' ').replaceAll('`', '').trim() ?? ''
      return [id, { title: title.trim(), statement }]
    }),
  )
}

function boundText(id: string): BoundText {
  texts ??= read()
  return texts.get(id) ?? { title: id, statement: '' }
}

/** The name of a bound in BOUNDS.md; its id where it has no entry. */
export const boundTitle = (id: string): string => boundText(id).title

/** The name of a bound and what it claims, from BOUNDS.md. */
export function boundStatement(id: string): string {
  const { title, statement } = boundText(id)
  return statement === '' ? title : `${title}: ${statement}`
}
