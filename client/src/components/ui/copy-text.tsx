import { useState } from 'react'
import { Button } from './button.tsx'

interface CopyTextProps {
  /** What the button says. */
  label: string
  text: string
  /** What was copied, said beside the button afterwards. */
  what?: string
}

/** A text to take along, with a button that copies it and says so. */
export function CopyText({ label, text, what = 'Text' }: CopyTextProps) {
  const [said, setSaid] = useState('')
  const copy = () =>
    navigator.clipboard.writeText(text).then(
      () => setSaid(`${what} copied.`),
      () => setSaid('The browser did not allow copying.'),
    )
  return (
    <span className="print:hidden">
      <Button tone="quiet" onClick={() => void copy()}>
        {label}
      </Button>{' '}
      <span role="status" className="text-soft">
        {said}
      </span>
    </span>
  )
}
