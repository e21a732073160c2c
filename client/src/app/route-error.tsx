import { useRouteError } from 'react-router-dom'
import { ErrorView } from '../components/ui/feedback.tsx'
import { Page } from '../components/ui/page.tsx'

/** What stands in place of a page that failed to load or broke while it was drawn. */
export function RouteError() {
  const error = useRouteError()
  return (
    <Page title="Error" head={<h1>This page broke</h1>}>
      <ErrorView title="The page could not be shown" error={error} onRetry={() => window.location.reload()} />
    </Page>
  )
}
