import type { ReactNode } from 'react'
import { problemOf } from '../../lib/errors.ts'
import { Button } from './button.tsx'
import type { ButtonTone } from './button.tsx'
import { Actions, Dialog } from './dialog.tsx'
import { Notice } from './notice.tsx'

interface ConfirmProps {
  open: boolean
  /** The act and its object: "End the session in Firefox on Linux". */
  title: ReactNode
  /** The button that does it, in the words of the act. */
  act: string
  /** While it is being done: "Ending …". */
  busy: string | false
  tone?: ButtonTone
  /** Why it was refused, if it was. */
  error?: unknown
  onConfirm: () => void
  onClose: () => void
  /** What will happen, and whether it can be taken back. */
  children: ReactNode
}

/** Asks once before something that can't be undone, and stays open with the reason where it is refused. */
export function Confirm({ open, title, act, busy, tone = 'grave', error, onConfirm, onClose, children }: ConfirmProps) {
  return (
    <Dialog open={open} title={title} onClose={onClose}>
      <div className="grid gap-3">{children}</div>
      {error !== undefined && error !== null && (
        <Notice tone="refused" title="Refused." className="mt-4" live>
          {problemOf(error).detail}
        </Notice>
      )}
      <Actions>
        <Button tone={tone} busy={busy} onClick={onConfirm}>
          {act}
        </Button>
        <Button onClick={onClose}>Leave it as it is</Button>
      </Actions>
    </Dialog>
  )
}
