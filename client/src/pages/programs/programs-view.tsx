import { pageHead } from '../../../../shared/page-head.ts'
import { files, paths } from '../../app/paths.ts'
import { type Fetched, Part } from '../../components/ui/fetched.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'
import type { ApiDocument, ApiOperation } from '../../features/programs/queries.ts'

/** The API as a page to read: every operation with what it takes and who may send it. */
export function ProgramsView({ document }: { document: Fetched<ApiDocument> }) {
  return (
    <Page
      about={pageHead('programs')}
      head={
        <>
          <h1>For programs</h1>
          <p className="mt-2 max-w-prose text-soft">Everything that these pages do, a program can do through the same addresses.</p>
        </>
      }
      margin={
        <>
          <MarginNote title="The document">
            <p><a href={files.apiDocument()}>OpenAPI 3.1</a>, made from the routes that run and the schemas that they check by.</p>
          </MarginNote>
          <MarginNote title="Access">
            <p>Make a token on the page of <TextLink to={paths.account()}>your account</TextLink> and send it with each request:</p>
            <p className="mt-2"><code>Authorization: Bearer …</code></p>
          </MarginNote>
        </>
      }
    >
      <Part of={document} what="the description of the API">
        {(found) => (
          <>
            <p className="max-w-prose">{found.info.description}</p>
            {grouped(found).map(([tag, operations]) => (
              <Section key={tag} title={tag} className="mt-9">
                <dl className="grid gap-5">
                  {operations.map(({ method, path, operation }) => (
                    <Operation key={operation.operationId} method={method} path={found.servers[0].url + path} operation={operation} />
                  ))}
                </dl>
              </Section>
            ))}
          </>
        )}
      </Part>
    </Page>
  )
}

interface Row {
  method: string
  path: string
  operation: ApiOperation
}

function grouped(document: ApiDocument): [string, Row[]][] {
  const groups = new Map<string, Row[]>()
  for (const [path, operations] of Object.entries(document.paths)) {
    for (const [method, operation] of Object.entries(operations)) {
      const tag = operation.tags[0]
      groups.set(tag, [...(groups.get(tag) ?? []), { method, path, operation }])
    }
  }
  return [...groups]
}

function Operation({ method, path, operation }: Row) {
  const [status] = Object.keys(operation.responses)
  const query = operation.parameters.filter((one) => one.in === 'query')
  const [media] = Object.keys(operation.requestBody?.content ?? {})
  return (
    <div id={operation.operationId}>
      <dt>
        <code className="break-all"><span className="font-semibold uppercase">{method}</span> {path}</code>
      </dt>
      <dd className="mt-1 max-w-prose">
        {operation.summary}. <span className="text-soft">{accessWords(operation)} Answers {status}.</span>
        {query.length > 0 && <span className="text-soft"> Query: {query.map(({ name, required }) => (required ? name : `${name}?`)).join(', ')}.</span>}
        {media && (
          <details className="mt-1">
            <summary className="cursor-pointer text-soft">Body: {media}</summary>
            <pre className="mt-2 max-h-96 overflow-auto border-l border-edge pl-4 text-[0.8rem] leading-snug">{JSON.stringify(operation.requestBody?.content[media].schema, null, 2)}</pre>
          </details>
        )}
      </dd>
    </div>
  )
}

function accessWords({ security }: ApiOperation): string {
  if (security.some((one) => Object.keys(one).length === 0)) return 'Open to everybody.'
  const scope = security.find((one) => 'token' in one)?.token?.[0]
  return scope ? `With a session, or a token with the scope ${scope}.` : 'With a session only.'
}
