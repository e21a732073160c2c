import { TextLink } from '../components/ui/link.tsx'
import { paths } from './paths.ts'

/** The foot of every page: the help, and the tools that need no account. */
export function Colophon() {
  const links: [label: string, to: string][] = [
    ['How it is certified', paths.about()],
    ['Verify a certificate', paths.verify()],
    ['For programs', paths.programs()],
    ['Digit check', paths.digitCheck()],
    ['Look up digits', paths.lookUp()],
    ['Public keys', paths.keys()],
  ]
  return (
    <footer className="mx-auto w-full max-w-[84rem] px-5 pb-8 sm:px-8 print:hidden">
      <nav aria-label="Help and tools" className="border-t border-rule pt-3 text-[0.92rem]">
        <ul className="flex flex-wrap gap-x-6 gap-y-1">
          {links.map(([label, to]) => (
            <li key={to}>
              <TextLink to={to}>{label}</TextLink>
            </li>
          ))}
        </ul>
      </nav>
    </footer>
  )
}
