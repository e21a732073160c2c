import type { ReactNode } from 'react'
import { pageHead } from '../../../../shared/page-head.ts'
import type { Role } from '../../../../shared/permissions.ts'
import type { Desk } from '../../../../shared/schemas/claim.ts'
import { paths } from '../../app/paths.ts'
import { StateMark } from '../../components/state-mark/state-mark.tsx'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { ButtonLink, TextLink } from '../../components/ui/link.tsx'
import { Page, Section } from '../../components/ui/page.tsx'
import { Table } from '../../components/ui/table.tsx'
import { Waiting } from '../../components/ui/time.tsx'
import { claimName } from '../../features/claims/claim-words.ts'
import { ClaimValue } from '../../features/claims/components/claim-table.tsx'

export interface DeskViewProps {
  desk: Desk | undefined
  error: unknown
  onRetry: () => void
  roles: readonly Role[]
}

const PARTS: { role: Role; title: string; nothing: ReactNode }[] = [
  { role: 'lead', title: 'To assign and to sign', nothing: 'No claim waits for a referee or a signature. What is submitted or endorsed in your group comes here.' },
  { role: 'referee', title: 'To referee', nothing: 'Nothing to referee. When a lead asks you, the claim comes here and you get a mail.' },
  { role: 'researcher', title: 'To answer and to finish', nothing: 'No draft waits to be finished and no objection to be answered.' },
]

/** What waits for this person, by role, the longest wait first. */
export function DeskView({ desk, error, onRetry, roles }: DeskViewProps) {
  const parts = PARTS.filter((part) => roles.includes(part.role) || (desk && desk[part.role].length > 0))
  const nothing = desk && parts.every((part) => desk[part.role].length === 0)
  return (
    <Page
      about={pageHead('desk')}
      head={
        <div className="flex flex-wrap items-baseline justify-between gap-x-8 gap-y-1">
          <h1>Desk</h1>
          {roles.includes('researcher') && <TextLink to={paths.importDigits()}>Import a table of digits</TextLink>}
        </div>
      }
    >
      {error && !desk ? (
        <ErrorView title="The desk could not be read" error={error} onRetry={onRetry} />
      ) : !desk ? (
        <Loading what="Looking what waits for you" />
      ) : nothing ? (
        <Empty title="Nothing waits for you.">
          {parts.map((part) => (
            <p key={part.role}>{part.nothing}</p>
          ))}
          {roles.includes('researcher') && (
            <ButtonLink to={paths.newRun()} tone="act">
              New run
            </ButtonLink>
          )}
        </Empty>
      ) : (
        parts.map((part) => (
          <Section key={part.role} title={part.title}>
            {desk[part.role].length === 0 ? <p className="text-soft">{part.nothing}</p> : <DeskTable caption={part.title} items={desk[part.role]} total={desk.total[part.role]} />}
          </Section>
        ))
      )}
    </Page>
  )
}

function DeskTable({ caption, items, total }: { caption: string; items: Desk[Role]; total: number }) {
  return (
    <>
      {total > items.length && <p className="text-soft">The {items.length} that have waited longest, of {total.toLocaleString('en')}.</p>}
      <Table
        caption={caption}
        rows={[...items].sort((one, other) => Date.parse(one.since) - Date.parse(other.since))}
        rowKey={(item) => `${item.kind} ${item.claim.id}`}
        columns={[
          { key: 'what', header: 'What to do', plain: true, cell: (item) => <TextLink to={paths.claim(item.claim)}>{item.text}</TextLink> },
          { key: 'claim', header: 'Claim', cell: (item) => <span className="whitespace-nowrap">{claimName(item.claim)}</span> },
          { key: 'value', header: 'Asserts', plain: true, cell: (item) => <ClaimValue claim={item.claim} limit={20} /> },
          { key: 'state', header: 'State', cell: (item) => <StateMark state={item.claim.state} /> },
          { key: 'author', header: 'Author', cell: (item) => item.claim.author.name },
          { key: 'since', header: 'Waiting', cell: (item) => <Waiting since={item.since} /> },
        ]}
      />
    </>
  )
}
