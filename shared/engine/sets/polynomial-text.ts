/** A polynomial in p from its coefficients in ascending powers: "p^2 - 2p + 1", highest power first. */
export function polynomialText(coefficients: readonly bigint[], latex: boolean): string {
  const terms = coefficients
    .map((c, power) => ({ c, power }))
    .filter(({ c }) => c !== 0n)
    .reverse()
  if (terms.length === 0) return '0'
  return terms
    .map(({ c, power }, index) => {
      const magnitude = c < 0n ? -c : c
      const sign = c < 0n ? (index === 0 ? '-' : ' - ') : index === 0 ? '' : ' + '
      const factor = magnitude === 1n && power > 0 ? '' : magnitude.toString()
      const variable = power === 0 ? '' : power === 1 ? 'p' : latex ? `p^{${power}}` : `p^${power}`
      return sign + factor + variable
    })
    .join('')
}

/** A quotient of polynomials in p as plain text, with no more brackets than it needs: "1/(p^2 - p)", "(6p - 1)/p^4". */
export function quotientText(numerator: readonly bigint[], denominator: readonly bigint[]): string {
  const [above, below] = [polynomialText(numerator, false), polynomialText(denominator, false)]
  return `${above.includes(' ') ? `(${above})` : above}/${/^(\d+|p(\^\d+)?)$/.test(below) ? below : `(${below})`}`
}
