import { useState } from 'react'
import { certifiedTruncated, intervalText, latexEnclosure, latexInterval } from '../../../../shared/digits.ts'
import { Button } from '../ui/button.tsx'
import { Menu } from '../ui/menu.tsx'

/** Copies the certified digits; the menu gives the ends, both, and LaTeX. What was copied is said beside it. */
export function CopyDigits({ lo, hi }: { lo: string; hi: string }) {
  const [said, setSaid] = useState('')
  const copy = async (what: string, text: string) => {
    try {
      await navigator.clipboard.writeText(text)
      setSaid(`${what} copied.`)
    } catch {
      setSaid('The browser did not allow copying. Select the digits and copy them by hand.')
    }
  }
  const { text } = certifiedTruncated(lo, hi)
  return (
    <span className="flex flex-wrap items-baseline gap-x-4 text-[0.92rem] print:hidden">
      {text !== null && (
        <Button tone="quiet" onClick={() => void copy('Certified digits', text)}>
          Copy certified digits
        </Button>
      )}
      <Menu
        label="Copy as …"
        items={[
          { label: 'Lower end', onSelect: () => void copy('Lower end', lo) },
          { label: 'Upper end', onSelect: () => void copy('Upper end', hi) },
          { label: 'Both, as [lo, hi]', onSelect: () => void copy('Both ends', intervalText(lo, hi)) },
          { label: 'LaTeX, certified digits', onSelect: () => void copy('LaTeX', latexEnclosure(lo, hi)) },
          { label: 'LaTeX, both ends', onSelect: () => void copy('LaTeX', latexInterval(lo, hi)) },
        ]}
      />
      <span role="status" className="text-soft">
        {said}
      </span>
    </span>
  )
}
