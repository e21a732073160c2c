import { readFileSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { expect, it } from 'vitest'

const ENGINE = join(import.meta.dirname, '../../shared/engine')
const ID = /\b[A-Z]{1,2}-\d+\b/g

/** Ids of the entries of BOUNDS.md: its headings of the third level. */
function stated(): string[] {
  return [...readFileSync(join(ENGINE, 'BOUNDS.md'), 'utf8').matchAll(/^### ([A-Z]{1,2}-\d+) \S/gm)].map((match) => match[1])
}

/** Where code cites which id. */
function cited(): Map<string, string> {
  const files = readdirSync(ENGINE, { recursive: true, encoding: 'utf8' }).filter((file) => file.endsWith('.ts'))
  return new Map(files.flatMap((file) => [...readFileSync(join(ENGINE, file), 'utf8').matchAll(ID)].map((match): [string, string] => [match[0], file])))
}

it('every bound that code cites stands in BOUNDS.md', () => {
  const known = new Set(stated())
  expect([...cited()].filter(([id]) => !known.has(id))).toEqual([])
})

it('every bound in BOUNDS.md is cited by code, and has one entry', () => {
  const used = cited()
  expect(stated().filter((id) => !used.has(id))).toEqual([])
  expect(new Set(stated()).size).toBe(stated().length)
})

it('every entry has a statement and a proof or source', () => {
  const entries = readFileSync(join(ENGINE, 'BOUNDS.md'), 'utf8').split(/^### /m).slice(1)
  const lacking = entries.filter((entry) => !entry.includes('*Statement.*') || !/\*(Proof|Source)\.\*/.test(entry))
  expect(lacking.map((entry) => entry.split('\n')[0])).toEqual([])
})
