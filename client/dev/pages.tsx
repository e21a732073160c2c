/** Views with example data, one at a time: `npx vite`, then /dev/pages.html?view=digit-check. Not part of the build. */
import type { ReactNode } from 'react'
import { createRoot } from 'react-dom/client'
import { createMemoryRouter, RouterProvider } from 'react-router-dom'
import '../src/styles.css'
import '../src/print.css'
import { Masthead } from '../src/app/masthead.tsx'
import { AccountExample } from './account.tsx'
import { DigitCheckPage } from './digit-check.tsx'
import { MAIN_PATH } from './main-path.tsx'

const VIEWS: Record<string, ReactNode> = {
  ...MAIN_PATH,
  account: <AccountExample />,
  'digit-check': <DigitCheckPage />,
}

const words = [
  { label: 'Register', to: '/register' },
  { label: 'Runs', to: '/runs' },
  { label: 'Desk', to: '/desk', count: 3 },
  { label: 'Estimates', to: '/estimates' },
  { label: 'Group', to: '/group' },
]
const view = new URLSearchParams(location.search).get('view') ?? ''

function Pages() {
  return (
    <>
      <Masthead words={words} person={{ name: 'Ilse Varga', group: 'Institute' }} onSearch={() => undefined} onAccount={() => undefined} onSignOut={() => undefined} />
      {VIEWS[view] ?? <ul className="p-8">{Object.keys(VIEWS).map((key) => <li key={key}><a href={`?view=${key}`}>{key}</a></li>)}</ul>}
    </>
  )
}

const router = createMemoryRouter([{ path: '*', element: <Pages /> }], { initialEntries: ['/group'] })
createRoot(document.getElementById('root') as HTMLElement).render(<RouterProvider router={router} />)
