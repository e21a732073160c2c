/** Relations and long numbers as they are printed: "x ≥ 908 994 923" for "x >= 908994923", with spaces that never break a line. */
export function printedText(text: string): string {
  return text
    .replace(/(\S) ?>= ?/g, '$1\u00a0≥\u00a0')
    .replace(/(\S) ?<= ?/g, '$1\u00a0≤\u00a0')
    .replace(/(\d) ?\* ?(?=\d)/g, '$1\u00a0·\u00a0')
    .replace(/\d{5,}/g, (digits) => digits.replace(/\B(?=(\d{3})+$)/g, '\u202f'))
}
