import { Fragment } from 'react'
import { printedRange } from '../estimate-filters.ts'

/** Text of the library as it is printed: "x ≥ 10¹⁹" for "x >= 10^19", thin spaces in long numbers. */
export function Printed({ text }: { text: string }) {
  const [first = '', ...rest] = printedRange(text).split(/\^(?=-?\d)/)
  return (
    <>
      {first}
      {rest.map((part, index) => {
        const [exponent = ''] = /^-?\d+/.exec(part) ?? []
        return (
          <Fragment key={index}>
            <sup className="leading-none">{exponent.replace('-', '−')}</sup>
            {part.slice(exponent.length)}
          </Fragment>
        )
      })}
    </>
  )
}
