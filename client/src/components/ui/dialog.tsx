import { useEffect, useId, useRef } from 'react'
import type { ReactNode } from 'react'

interface DialogProps {
  open: boolean
  /** The act and its object: "Sign MST-0042/2". */
  title: ReactNode
  onClose: () => void
  children: ReactNode
}

/** A modal question. The native element traps the focus, closes on Escape and gives the focus back where it came from. */
export function Dialog({ open, title, onClose, children }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null)
  const titleId = useId()

  useEffect(() => {
    const dialog = ref.current
    if (!dialog) return
    if (open && !dialog.open) dialog.showModal()
    if (!open && dialog.open) dialog.close()
  }, [open])

  return (
    <dialog
      ref={ref}
      aria-labelledby={titleId}
      onClose={onClose}
      className="m-auto w-[min(40rem,calc(100vw-2rem))] border-t-4 border-double border-ink bg-paper px-6 py-5 text-ink sm:px-8 sm:py-7"
    >
      <h2 id={titleId} className="mb-3 text-[1.4rem] font-normal leading-tight">
        {title}
      </h2>
      {open && children}
    </dialog>
  )
}

/** The row of buttons that ends a dialog or a form; the act comes first. */
export function Actions({ children }: { children: ReactNode }) {
  return <div className="mt-5 flex flex-wrap items-center gap-x-4 gap-y-2">{children}</div>
}
