const BROWSERS: [pattern: RegExp, name: string][] = [
  [/\bEdgA?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bFirefox\/|\bFxiOS\//, 'Firefox'],
  [/\bChrome\/|\bCriOS\/|\bHeadlessChrome\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
  [/^curl\//, 'curl'],
]
const SYSTEMS: [pattern: RegExp, name: string][] = [
  [/Android/, 'Android'],
  [/iPhone|iPad|iOS/, 'iOS'],
  [/Windows/, 'Windows'],
  [/Mac OS X|Macintosh/, 'macOS'],
  [/CrOS/, 'ChromeOS'],
  [/Linux|X11/, 'Linux'],
]

const nameOf = (table: [RegExp, string][], text: string) => table.find(([pattern]) => pattern.test(text))?.[1]

/** "Firefox on Linux": enough for a person to know their own devices apart. It is what the browser says of itself, no proof. */
export function deviceInWords(userAgent: string): string {
  const browser = nameOf(BROWSERS, userAgent)
  const system = nameOf(SYSTEMS, userAgent)
  if (browser && system) return `${browser} on ${system}`
  return browser ?? system ?? 'an unnamed program'
}
