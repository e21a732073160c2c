/** What the schemas say of a field ("is needed", "write a whole number") as a sentence of its own. */
export function sentence(words: string): string {
  const text = words.trim()
  if (text === '') return ''
  // A sentence about k or y begins with the small letter that the variable is.
  const variable = /^[b-z]\b/.test(text)
  const whole = /^(is|has|must|can’t|cannot) /.test(text) ? `This ${text}` : variable ? text : text.charAt(0).toUpperCase() + text.slice(1)
  return /[.!?…]$/.test(whole) ? whole : `${whole}.`
}
