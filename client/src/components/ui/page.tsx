import type { ReactNode } from 'react'
import type { PageHead } from '../../../../shared/page-head.ts'
import { classNames } from '../../lib/class-names.ts'
import { useDocumentHead } from '../../lib/use-document-head.ts'

interface PageProps {
  /** How the browser and search engines know the page. */
  about: PageHead
  /** The head of the page: its subject. */
  head: ReactNode
  /** What the main matter rests on: provenance, estimates, history. Beside it on wide screens, after it on narrow ones. */
  margin?: ReactNode
  children: ReactNode
}

/** One main column and, where there is something to put there, a margin column. */
export function Page({ about, head, margin, children }: PageProps) {
  useDocumentHead(about)
  return (
    <main id="main" tabIndex={-1} className="mx-auto w-full max-w-[84rem] px-5 pt-7 pb-20 outline-none sm:px-8 print:p-0">
      <header className="mb-7">{head}</header>
      {margin ? (
        <div className="grid gap-x-12 gap-y-10 wide:grid-cols-[minmax(0,1fr)_19rem] print:block">
          <div className="min-w-0">{children}</div>
          <aside aria-label="What this rests on" className="min-w-0 text-[0.92rem] leading-snug wide:border-l wide:border-rule wide:pl-7 print:mt-5 print:columns-2 print:gap-10 print:border-0 print:pl-0">
            {margin}
          </aside>
        </div>
      ) : (
        children
      )}
    </main>
  )
}

interface SectionProps {
  title: ReactNode
  /** A short remark or act at the right end of the heading's line. */
  beside?: ReactNode
  children: ReactNode
  className?: string
  id?: string
}

/** A part of the main column under its heading. */
export function Section({ title, beside, children, className, id }: SectionProps) {
  return (
    <section id={id} className={classNames('mt-10 first:mt-0', className)}>
      <div className="section-head">
        <h2>{title}</h2>
        {beside && <div className="text-[0.92rem] text-soft">{beside}</div>}
      </div>
      {children}
    </section>
  )
}

/** A note in the margin column. */
export function MarginNote({ title, children }: { title: ReactNode; children: ReactNode }) {
  return (
    <section className="mb-7 break-inside-avoid">
      <h3 className="mb-1 text-[1rem] font-normal italic">{title}</h3>
      {children}
    </section>
  )
}

/** Terms with what they stand for, set as a run of lines. */
export function Facts({ facts }: { facts: [term: ReactNode, value: ReactNode][] }) {
  return (
    <dl className="grid grid-cols-[auto_minmax(0,1fr)] gap-x-4 gap-y-1">
      {facts.map(([term, value], index) => (
        <div key={index} className="contents">
          <dt className="text-soft">{term}</dt>
          <dd className="min-w-0 break-words">{value}</dd>
        </div>
      ))}
    </dl>
  )
}
