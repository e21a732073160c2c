import type { ReactNode } from 'react'
import { classNames } from '../../lib/class-names.ts'

export type NoticeTone = 'done' | 'undecided' | 'refused' | 'plain'

const TONES: Record<NoticeTone, string> = {
  done: 'bg-wash-certain border-certain',
  undecided: 'bg-wash-undecided border-undecided',
  refused: 'bg-wash-refused border-refused',
  plain: 'bg-shade border-edge',
}

interface NoticeProps {
  tone: NoticeTone
  /** First words, which say the matter: "Signed.", "In conflict." */
  title: ReactNode
  children?: ReactNode
  className?: string
  /** Read out when it appears; leave it off for a notice that belongs to the page from the start. */
  live?: boolean
}

/** A ruled paragraph that says what was done, what is in doubt, or what was refused, and what to do next. */
export function Notice({ tone, title, children, className, live }: NoticeProps) {
  return (
    <div role={live ? (tone === 'refused' ? 'alert' : 'status') : undefined} className={classNames('border-y px-4 py-2.5', TONES[tone], className)}>
      <strong className="font-semibold">{title}</strong> {children}
    </div>
  )
}
