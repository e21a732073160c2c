import { useId, useState } from 'react'
import type { DragEvent, ReactNode } from 'react'
import { classNames } from '../../lib/class-names.ts'

interface FileDropProps {
  label: ReactNode
  hint?: ReactNode
  /** As of an input: ".json,application/json". */
  accept: string
  onFile: (file: File) => void
}

/** A field that takes a file by choosing it or by dropping it anywhere on the field. */
export function FileDrop({ label, hint, accept, onFile }: FileDropProps) {
  const id = useId()
  const [over, setOver] = useState(false)
  const drop = (event: DragEvent) => {
    event.preventDefault()
    setOver(false)
    const file = event.dataTransfer.files[0]
    if (file) onFile(file)
  }
  return (
    <div
      onDragOver={(event) => {
        event.preventDefault()
        setOver(true)
      }}
      onDragLeave={() => setOver(false)}
      onDrop={drop}
      className={classNames('grid gap-2 border border-dashed px-5 py-6', over ? 'border-certain bg-wash-certain' : 'border-edge bg-leaf')}
    >
      <label htmlFor={id} className="font-semibold leading-tight">
        {label}
      </label>
      {hint && (
        <div id={`${id}-hint`} className="text-[0.92rem] leading-snug text-soft">
          {hint}
        </div>
      )}
      <input
        id={id}
        type="file"
        accept={accept}
        aria-describedby={hint ? `${id}-hint` : undefined}
        className="mt-1 w-full max-w-md file:mr-4 file:min-h-9 file:rounded-slight file:border file:border-edge file:bg-paper file:px-3.5 file:py-1 file:text-ink"
        onChange={(event) => {
          const file = event.target.files?.[0]
          if (file) onFile(file)
          // The same file, changed meanwhile, can be chosen again.
          event.target.value = ''
        }}
      />
    </div>
  )
}
