import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, test } from 'vitest'

const css = readFileSync(resolve(import.meta.dirname, '../../client/src/styles.css'), 'utf8')

function colours(block: string): Record<string, string> {
  return Object.fromEntries([...block.matchAll(/--color-([a-z-]+):\s*(#[0-9a-f]{6})/g)].map(([, name, value]) => [name, value]))
}
const between = (start: string, end: string) => css.slice(css.indexOf(start), css.indexOf(end, css.indexOf(start)))
const day = colours(between('@theme', '\n}'))
const schemes = {
  day,
  night: { ...day, ...colours(between('@media (prefers-color-scheme: dark)', '\n}')) },
  print: { ...day, ...colours(between('@media print', '\n}')) },
}

/** Relative luminance and contrast as WCAG 2.2 defines them (https://www.w3.org/TR/WCAG22/#dfn-relative-luminance). */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((at) => {
    const channel = Number.parseInt(hex.slice(at, at + 2), 16) / 255
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}
function contrast(one: string, other: string): number {
  const [light = 0, dark = 0] = [luminance(one), luminance(other)].sort((a, b) => b - a)
  return (light + 0.05) / (dark + 0.05)
}

const GROUNDS = ['paper', 'leaf', 'shade', 'wash-certain', 'wash-undecided', 'wash-refused']
const TEXTS = ['ink', 'soft', 'certain', 'undecided', 'refused']

test('the formula gives the known extremes', () => {
  expect(contrast('#ffffff', '#000000')).toBeCloseTo(21, 5)
  expect(contrast('#777777', '#ffffff')).toBeCloseTo(4.48, 2)
})

describe.each(Object.entries(schemes))('%s scheme', (_name, scheme) => {
  const pair = (text: string, ground: string) => contrast(scheme[text] ?? '', scheme[ground] ?? '')
  test.each(TEXTS.flatMap((text) => GROUNDS.map((ground) => [text, ground] as const)))('%s on %s reads at 4.5:1', (text, ground) => {
    expect(pair(text, ground)).toBeGreaterThanOrEqual(4.5)
  })
  test.each(['ink', 'certain', 'refused', 'undecided', 'soft'])('paper on a filled %s reads at 4.5:1', (fill) => {
    expect(pair('paper', fill)).toBeGreaterThanOrEqual(4.5)
  })
  test.each(['paper', 'leaf', 'shade'])('the edge of a control stands out from %s at 3:1', (ground) => {
    expect(pair('edge', ground)).toBeGreaterThanOrEqual(3)
  })
})
