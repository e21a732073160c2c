import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { projectRoot } from '../project-root.ts'

let statements: Map<string, string> | undefined

/** Headings of BOUNDS.md are "### T-2 Trapezoid rule"; what follows an id is the bound's title. */
function read(): Map<string, string> {
  const text = readFileSync(join(projectRoot, 'shared', 'engine', 'BOUNDS.md'), 'utf8')
  return new Map([...text.matchAll(/^#{2,4}\s+([A-Z]{1,3}-\d+[a-z]?)[\s.:—–-]+(.+)$/gm)].map(([, id, title]) => [id, title.trim()]))
}

/** A bound in one line, from BOUNDS.md; its id where it has no entry. */
export function boundStatement(id: string): string {
  statements ??= read()
  return statements.get(id) ?? id
}
