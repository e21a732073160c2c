import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'
import type { LinkProps } from 'react-router-dom'
import { classNames } from '../../lib/class-names.ts'
import { buttonClass } from './button.tsx'
import type { ButtonTone } from './button.tsx'

const TEXT_LINK = 'text-certain underline decoration-rule decoration-1 underline-offset-[0.2em] hover:text-ink hover:decoration-current'

/** A link inside running text or a table. */
export function TextLink({ className, ...rest }: LinkProps) {
  return <Link {...rest} className={classNames(TEXT_LINK, className)} />
}

/** A link to another page that looks like a button, where it begins the page's work. */
export function ButtonLink({ tone = 'plain', className, ...rest }: LinkProps & { tone?: ButtonTone }) {
  return <Link {...rest} className={classNames(buttonClass(tone), className)} />
}

interface FileLinkProps {
  href: string
  /** Name under which the file is kept. */
  download?: string
  children: ReactNode
  className?: string
}

/** A link to a file of the server, outside the router. */
export function FileLink({ href, download, children, className }: FileLinkProps) {
  return (
    <a href={href} download={download ?? true} className={classNames(TEXT_LINK, className)}>
      {children}
    </a>
  )
}
