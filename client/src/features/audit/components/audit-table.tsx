import type { ReactNode } from 'react'
import type { AuditEntry } from '../../../../../shared/schemas/group.ts'
import { paths } from '../../../app/paths.ts'
import { Printed } from '../../../components/formula/printed.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Facts } from '../../../components/ui/page.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { actWords } from '../act-words.ts'

interface AuditTableProps {
  entries: AuditEntry[]
  onTurn: (direction: 'previous' | 'next') => void
  busy: boolean
}

/** Entries of the trail, newest first, each with its reason, its detail and its place in the chain. */
export function AuditTable({ entries, onTurn, busy }: AuditTableProps) {
  return (
    <Table
      caption="Audit trail"
      rows={entries}
      rowKey={({ seq }) => String(seq)}
      onTurn={onTurn}
      busy={busy}
      columns={[
        { key: 'seq', header: 'Entry', cell: ({ seq }) => seq },
        { key: 'at', header: 'When', cell: ({ at }) => <Time at={at} precise /> },
        { key: 'who', header: 'Who', cell: ({ actor }) => actor?.name ?? <span className="text-soft italic">Merestone</span> },
        { key: 'what', header: 'Did what', cell: (entry) => <Deed entry={entry} /> },
        { key: 'chain', header: 'Chain', className: 'md:w-[22%]', cell: (entry) => <ChainDetail entry={entry} /> },
      ]}
    />
  )
}

function Deed({ entry }: { entry: AuditEntry }) {
  const { words, names } = actWords(entry.act, entry.subject.kind === 'member' && entry.subject.id === entry.actor?.id)
  return (
    <span>
      {words} {names && <Subject {...entry.subject} />}
      {entry.reason && <span className="block max-w-prose whitespace-pre-line text-soft">“{entry.reason}”</span>}
    </span>
  )
}

function Subject({ kind, id, label }: AuditEntry['subject']): ReactNode {
  if (kind === 'claim') return <TextLink to={paths.claim(/^MST-\d+\/\d+$/.test(label) ? label : id)}>{label || 'a draft'}</TextLink>
  if (kind === 'constant') return <TextLink to={paths.constant(/^MST-\d+$/.test(label) ? label : id)}>{label}</TextLink>
  if (kind === 'run') return <TextLink to={paths.run(id)}>{label || 'a run'}</TextLink>
  if (kind === 'estimate') return <TextLink to={paths.estimate(id)}><Printed text={label} /></TextLink>
  return <span className="break-words">{label}</span>
}

/** A detail of an entry for reading; the exported trail has it to the letter. Of mails the kind is shown and not to which row they went. */
function detailText(key: string, value: unknown): string {
  if (typeof value === 'string') return value
  if (value === null) return 'none'
  if (Array.isArray(value) && value.every((item) => typeof item === 'string')) return value.map((item) => (key === 'told' ? item.split(':')[0] : item)).join(', ')
  return JSON.stringify(value)
}

function ChainDetail({ entry }: { entry: AuditEntry }) {
  const detail = Object.entries(entry.detail).filter(([key]) => key !== 'referee')
  return (
    <details className="min-w-0">
      <summary>
        <code title={entry.hash}>{entry.hash.slice(0, 12)}…</code>
      </summary>
      <div className="mt-2 text-[0.88rem]">
        <Facts
          facts={[
            ...detail.map(([key, value]): [string, string] => [key, detailText(key, value)]),
            ...(entry.digest ? [['digest', <code key="digest" className="break-all">{entry.digest}</code>] as [string, ReactNode]] : []),
            ['hash', <code key="hash" className="break-all">{entry.hash}</code>],
            ['before it', <code key="before" className="break-all">{entry.previousHash}</code>],
          ]}
        />
      </div>
    </details>
  )
}
