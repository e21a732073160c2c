const SYMBOLS: Record<string, string> = { theta: 'θ', psi: 'ψ', phi: 'φ', pi: 'π', sqrt: '√' }

/**
 * Relations, symbols and long numbers as they are printed: "x ≥ 908 994 923" for "x >= 908994923", "θ(x)" for "theta(x)", with spaces
 * that never break a line. Names with hyphens, such as ids of estimates, and digits after a point stay as they are.
 */
export function printedText(text: string): string {
  return text
    .replace(/(\S) ?>= ?/g, '$1\u00a0≥\u00a0')
    .replace(/(\S) ?<= ?/g, '$1\u00a0≤\u00a0')
    .replace(/(\d) ?\* ?(?=\d)/g, '$1\u00a0·\u00a0')
    .replace(/(\d)e(-?\d+)\b/g, '$1\u00a0·\u00a010^$2')
    .replace(/ ([<>]) /g, '\u00a0$1\u00a0')
    .replaceAll(' - ', ' − ')
    .replace(/\b(?:theta|psi|phi|pi|sqrt)\b(?!-)/g, (name) => SYMBOLS[name] ?? name)
    .replace(/(?<![.\d])\d{5,}/g, (digits) => digits.replace(/\B(?=(\d{3})+$)/g, '\u202f'))
}

/** What stands raised or lowered after ^ or _: in brackets, or a number or word with its sign. */
const SCRIPT = /([\^_])(-?(?:\([^()]*\)|\{[^{}]*\}|⌈[^⌈⌉]*⌉|[\p{L}\d]+|∞))/u

export interface PrintedPart {
  place: 'line' | 'raised' | 'lowered'
  text: string
}

/** Plain text with its mathematics as it is printed, part by part: what stands on the line, raised and lowered. */
export function printedParts(text: string): PrintedPart[] {
  // Split by a pattern with two groups, the text comes as plain, mark, script, plain, mark, script, …, plain.
  const pieces = printedText(text).split(SCRIPT)
  return pieces.flatMap((piece, index): PrintedPart[] => {
    if (index % 3 === 1) return []
    if (index % 3 === 0) return [{ place: 'line', text: piece }]
    return [{ place: pieces[index - 1] === '^' ? 'raised' : 'lowered', text: piece.replace(/^[({](.*)[)}]$/, '$1').replaceAll('-', '−') }]
  })
}

/** Longest LaTeX of a formula that a line holds; what is longer, such as a list of a hundred excluded primes, is told in words. */
const LONGEST_FORMULA = 220

export const fitsOneLine = (latex: string): boolean => latex.length <= LONGEST_FORMULA
