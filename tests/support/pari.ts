import { execFileSync } from 'node:child_process'

/** The lines that PARI/GP (Debian package pari-gp) prints for a program. */
export function gp(program: string): string[] {
  // A definition in braces may go over several lines; gp reads it so from a file's text only.
  const printed = execFileSync('gp', ['-q', '-f', '-s', '256M'], { input: joinBraces(program), encoding: 'utf8', maxBuffer: 2 ** 26 })
  return printed.split('\n').map((line) => line.trim()).filter((line) => line !== '')
}

/** Puts what stands in braces on one line. */
function joinBraces(program: string): string {
  let depth = 0
  return [...program].map((c) => ((depth += c === '{' ? 1 : c === '}' ? -1 : 0), c === '\n' && depth > 0 ? ' ' : c)).join('')
}
