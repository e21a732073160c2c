/** Components with example data, to look at while working on them: `npx vite`, then /dev/gallery.html. Not part of the build. */
import { createRoot } from 'react-dom/client'
import { createMemoryRouter, RouterProvider } from 'react-router-dom'
import '../src/styles.css'
import '../src/print.css'
import { Masthead } from '../src/app/masthead.tsx'
import { SkipLink } from '../src/app/skip-link.tsx'
import { ComponentsPage } from './components.tsx'

const words = [
  { label: 'Register', to: '/register' },
  { label: 'Runs', to: '/runs' },
  { label: 'Desk', to: '/desk', count: 3 },
  { label: 'Estimates', to: '/estimates' },
  { label: 'Group', to: '/group/members' },
]

function Gallery() {
  return (
    <>
      <SkipLink />
      <Masthead words={words} person={{ name: 'Ilse Varga', group: 'Institute' }} onSearch={() => undefined} onAccount={() => undefined} onSignOut={() => undefined} />
      <ComponentsPage />
    </>
  )
}

const router = createMemoryRouter([{ path: '*', element: <Gallery /> }], { initialEntries: ['/register'] })
createRoot(document.getElementById('root') as HTMLElement).render(<RouterProvider router={router} />)
