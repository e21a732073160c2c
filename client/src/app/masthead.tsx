import { NavLink, Link } from 'react-router-dom'
import type { FormEvent } from 'react'
import { classNames } from '../lib/class-names.ts'
import { Menu } from '../components/ui/menu.tsx'
import { TextLink } from '../components/ui/link.tsx'
import { paths } from './paths.ts'

export interface NavigationWord {
  label: string
  to: string
  /** How many things wait there. */
  count?: number | undefined
}

interface MastheadProps {
  words: NavigationWord[]
  /** Null for a reader without an account. */
  person: { name: string; group: string } | null
  /** Null on the page that has this search among its filters. */
  onSearch: ((text: string) => void) | null
  onAccount: () => void
  onSignOut: () => void
}

/** Name, search and person on the first line, the navigation in words on the second, a double rule below. */
export function Masthead({ words, person, onSearch, onAccount, onSignOut }: MastheadProps) {
  const search = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault()
    const text = new FormData(event.currentTarget).get('text')
    onSearch?.(typeof text === 'string' ? text.trim() : '')
  }
  return (
    <header className="mx-auto w-full max-w-[84rem] px-5 pt-4 sm:px-8 print:hidden">
      <div className="flex flex-wrap items-center gap-x-8 gap-y-3">
        <Link to={paths.home()} className="flex items-end gap-2 text-[1.65rem] leading-none tracking-[-0.01em] no-underline">
          <svg viewBox="0 0 24 24" aria-hidden="true" className="size-7 fill-certain stroke-certain">
            <path d="M8.6 20 9.2 7.2C9.4 4.2 10.6 2.6 12.4 2.7 14.4 2.8 15.2 4.6 15.3 7.4L15.8 20z" stroke="none" />
            <path d="M2 20.6H22" strokeWidth="1.6" strokeLinecap="round" />
          </svg>
          Merestone
        </Link>
        {onSearch && (
          <form role="search" onSubmit={search} className="order-last flex w-full min-w-0 sm:order-none sm:ml-auto sm:w-80">
            <label htmlFor="masthead-search" className="sr-only">
              Find a constant
            </label>
            <input
              id="masthead-search"
              name="text"
              type="search"
              placeholder="Digits, number or words"
              className="min-w-0 flex-1 rounded-slight border border-edge bg-leaf px-2.5 py-1 placeholder:text-soft"
            />
            <button type="submit" className="ml-2 text-certain underline underline-offset-[0.2em] hover:text-ink">
              Find
            </button>
          </form>
        )}
        <div className={classNames('ml-auto', onSearch && 'sm:ml-0')}>
          {person ? (
            <Menu
              label={person.name}
              items={[
                { label: 'Account', onSelect: onAccount },
                { label: 'Sign out', onSelect: onSignOut },
              ]}
            />
          ) : (
            <TextLink to={paths.signIn()}>Sign in</TextLink>
          )}
        </div>
      </div>
      <nav aria-label="Main" className="mt-3 border-b-4 border-double border-ink">
        <ul className="flex flex-wrap gap-x-7">
          {words.map(({ label, to, count }) => (
            <li key={to}>
              <NavLink
                to={to}
                className={({ isActive }) => classNames('-mb-px block border-b-[3px] pt-0.5 pb-1 no-underline', isActive ? 'border-certain' : 'border-transparent text-soft hover:text-ink')}
              >
                {label}
                {count ? (
                  <span className="ml-1.5 text-[0.85em]">
                    ({count}<span className="sr-only"> waiting</span>)
                  </span>
                ) : null}
              </NavLink>
            </li>
          ))}
        </ul>
      </nav>
    </header>
  )
}
