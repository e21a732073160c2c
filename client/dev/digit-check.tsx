import { useState } from 'react'
import { pageHead } from '../../shared/page-head.ts'
import { DigitCheckForm } from '../src/features/digit-check/components/digit-check.tsx'
import type { DigitCheckValue } from '../src/features/digit-check/components/digit-check.tsx'
import { Page, Section } from '../src/components/ui/page.tsx'

const PRIMES = { lo: '1.63661632335126086856', hi: '1.63661632335126086859' }
const EXAMPLES: DigitCheckValue[] = [
  { text: '1.63661 63233 51260', reading: 'truncated' },
  { text: '1,636616323{\\,}351266 0868', reading: 'truncated' },
  { text: '1.636616323351260868571', reading: 'rounded' },
  { text: '-1.63664(3)', reading: 'rounded' },
  { text: '1.2.3', reading: 'rounded' },
]

function Example({ start }: { start: DigitCheckValue }) {
  const [value, setValue] = useState(start)
  return <DigitCheckForm {...value} {...PRIMES} onChange={setValue} />
}

/** The digit check in every state that it has. */
export function DigitCheckPage() {
  return (
    <Page about={pageHead('digitCheck')} head={<h1>Digit check</h1>}>
      {EXAMPLES.map((start) => (
        <Section key={start.text} title={start.text}>
          <Example start={start} />
        </Section>
      ))}
    </Page>
  )
}
