import { printedText } from '../../../../shared/printed-text.ts'

/** What stands raised or lowered after ^ or _: in brackets, or a number or word with its sign. */
const SCRIPT = /([\^_])(-?(?:\([^()]*\)|\{[^{}]*\}|[\p{L}\d]+|∞))/u

/** Plain text with its mathematics as it is printed: "x ≥ 10¹⁹" for "x >= 10^19", thin spaces in long numbers. */
export function Printed({ text }: { text: string }) {
  // Split by a pattern with two groups, the text comes as plain, mark, script, plain, mark, script, …, plain.
  const parts = printedText(text).split(SCRIPT)
  return parts.map((part, index) => {
    if (index % 3 === 1) return null
    if (index % 3 === 0) return part
    const script = part.replace(/^[({](.*)[)}]$/, '$1').replaceAll('-', '−')
    return parts[index - 1] === '^' ? <sup key={index} className="whitespace-nowrap leading-none">{script}</sup> : <sub key={index} className="whitespace-nowrap leading-none">{script}</sub>
  })
}
