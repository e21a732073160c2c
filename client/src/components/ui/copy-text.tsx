import { useState } from 'react'
import { Button } from './button.tsx'

/** A text to take along, with a button that copies it and says so. */
export function CopyText({ label, text }: { label: string; text: string }) {
  const [said, setSaid] = useState('')
  const copy = () =>
    navigator.clipboard.writeText(text).then(
      () => setSaid('Copied.'),
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
