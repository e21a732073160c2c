import { printedParts } from '../../../../shared/printed-text.ts'

/** Plain text with its mathematics as it is printed: "x ≥ 10¹⁹" for "x >= 10^19", thin spaces in long numbers. */
export function Printed({ text }: { text: string }) {
  return printedParts(text).map(({ place, text: part }, index) => {
    if (place === 'line') return part
    return place === 'raised' ? <sup key={index} className="whitespace-nowrap leading-none">{part}</sup> : <sub key={index} className="whitespace-nowrap leading-none">{part}</sub>
  })
}
