import { useEffect, useId, useRef, useState } from 'react'
import type { KeyboardEvent, ReactNode } from 'react'
import { buttonClass } from './button.tsx'
import type { ButtonTone } from './button.tsx'

export interface MenuItem {
  label: ReactNode
  onSelect: () => void
}

interface MenuProps {
  label: ReactNode
  items: MenuItem[]
  tone?: ButtonTone
}

/** A button that opens a short list of acts. Arrow keys, Home and End move, Escape closes, the focus returns to the button. */
export function Menu({ label, items, tone = 'quiet' }: MenuProps) {
  const [open, setOpen] = useState(false)
  const menuId = useId()
  const root = useRef<HTMLSpanElement>(null)
  const button = useRef<HTMLButtonElement>(null)
  const list = useRef<HTMLDivElement>(null)
  const entries = () => [...(list.current?.querySelectorAll<HTMLElement>('[role="menuitem"]') ?? [])]

  useEffect(() => {
    if (!open) return
    list.current?.querySelector<HTMLElement>('[role="menuitem"]')?.focus()
    const closeOutside = (event: PointerEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false)
    }
    document.addEventListener('pointerdown', closeOutside)
    return () => document.removeEventListener('pointerdown', closeOutside)
  }, [open])

  const close = () => {
    setOpen(false)
    button.current?.focus()
  }
  const onKeyDown = (event: KeyboardEvent) => {
    const all = entries()
    const at = all.indexOf(document.activeElement as HTMLElement)
    const target = { ArrowDown: (at + 1) % all.length, ArrowUp: (at - 1 + all.length) % all.length, Home: 0, End: all.length - 1 }[event.key]
    if (target !== undefined) {
      event.preventDefault()
      all[target]?.focus()
    } else if (event.key === 'Escape') {
      event.stopPropagation()
      close()
    } else if (event.key === 'Tab') setOpen(false)
  }

  return (
    <span ref={root} className="relative inline-block print:hidden">
      <button
        ref={button}
        type="button"
        aria-haspopup="menu"
        aria-expanded={open}
        aria-controls={open ? menuId : undefined}
        className={buttonClass(tone)}
        onClick={() => setOpen(!open)}
      >
        {label}
      </button>
      {open && (
        <div ref={list} id={menuId} role="menu" onKeyDown={onKeyDown} className="absolute left-0 z-20 mt-1 min-w-56 border border-ink bg-leaf py-1 text-base">
          {items.map((item, index) => (
            <button
              key={index}
              type="button"
              role="menuitem"
              tabIndex={-1}
              className="block w-full px-3 py-1 text-left text-ink hover:bg-shade focus-visible:bg-shade focus-visible:outline-offset-[-2px]"
              onClick={() => {
                item.onSelect()
                close()
              }}
            >
              {item.label}
            </button>
          ))}
        </div>
      )}
    </span>
  )
}
