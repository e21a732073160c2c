import { useLocation } from 'react-router-dom'
import { pageHead } from '../../../../shared/page-head.ts'
import { paths } from '../../app/paths.ts'
import { ButtonLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'

/** Where somebody arrives who has left their group. */
export function LeftPage() {
  const { state } = useLocation() as { state: { group?: string } | null }
  return (
    <Page about={pageHead('groupLeft')} head={<h1>You have left {state?.group ?? 'the group'}</h1>}>
      <div className="grid max-w-prose justify-items-start gap-5">
        <Notice tone="done" title="Left." live>
          You are signed out everywhere, and your access tokens work no more. Your name stays on what you claimed, confirmed and signed. A lead can invite you anew.
        </Notice>
        <ButtonLink to={paths.register()}>Read the register</ButtonLink>
      </div>
    </Page>
  )
}
