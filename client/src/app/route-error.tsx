import { useRouteError } from 'react-router-dom'
import { UNKNOWN_PAGE } from '../../../shared/page-head.ts'
import { ErrorView } from '../components/ui/feedback.tsx'
import { Page } from '../components/ui/page.tsx'

const BROKEN = { ...UNKNOWN_PAGE, title: 'Error' }

/** What stands in place of a page that failed to load or broke while it was drawn. */
export function RouteError() {
  const error = useRouteError()
  return (
    <Page about={BROKEN} head={<h1>This page broke</h1>}>
      <ErrorView title="The page could not be shown" error={error} onRetry={() => window.location.reload()} />
    </Page>
  )
}
