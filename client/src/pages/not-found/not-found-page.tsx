import { UNKNOWN_PAGE } from '../../../../shared/page-head.ts'
import { paths } from '../../app/paths.ts'
import { ButtonLink } from '../../components/ui/link.tsx'
import { Page } from '../../components/ui/page.tsx'

export function NotFoundPage() {
  return (
    <Page about={UNKNOWN_PAGE} head={<h1>Nothing stands here</h1>}>
      <p className="mb-4 max-w-prose">No page has this address. It may have been mistyped; register numbers look like MST-0042, claims like MST-0042/1.</p>
      <ButtonLink to={paths.register()} tone="act">
        To the register
      </ButtonLink>
    </Page>
  )
}
