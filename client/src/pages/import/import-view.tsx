import { pageHead } from '../../../../shared/page-head.ts'
import type { ImportLine, ImportPreview, ImportResult } from '../../../../shared/schemas/import.ts'
import { paths } from '../../app/paths.ts'
import { Formula } from '../../components/formula/formula.tsx'
import { Button } from '../../components/ui/button.tsx'
import { Empty, ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { FileDrop } from '../../components/ui/file-drop.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { type Column, Table } from '../../components/ui/table.tsx'

interface ImportViewProps {
  fileName: string | null
  preview: ImportPreview | null
  busy: boolean
  error: Error | null
  result: ImportResult | null
  onFile: (file: File) => void
  onImport: () => void
}

const VERDICTS: Record<ImportLine['verdict'], string> = {
  new: 'new constant',
  first: 'first value',
  meets: 'meets the register',
  contradicts: 'contradicts the register',
  bad: 'cannot be read',
}

const COLUMNS: Column<ImportLine>[] = [
  { key: 'line', header: 'Line', align: 'right', cell: ({ line }) => line },
  { key: 'constant', header: 'Constant', cell: ({ constant, definition }) => (definition ? <span className="inline-flex flex-wrap items-baseline gap-x-3">{constant && <TextLink to={paths.constant(constant)}>{constant}</TextLink>}<Formula latex={definition.latex} text={definition.text} /></span> : '—') },
  { key: 'enclosure', header: 'Read as', cell: ({ enclosure }) => (enclosure ? <span className="break-all">[{enclosure.lo}, {enclosure.hi}]</span> : '—') },
  { key: 'verdict', header: 'Verdict', cell: ({ verdict, message }) => <span className={verdict === 'bad' || verdict === 'contradicts' ? 'text-refused' : undefined}><strong className="font-semibold">{VERDICTS[verdict]}.</strong> {message}</span> },
]

/** A table of digits from a paper: looked at line by line, then drafted. */
export function ImportView({ fileName, preview, busy, error, result, onFile, onImport }: ImportViewProps) {
  const good = preview?.lines.filter(({ verdict }) => verdict !== 'bad').length ?? 0
  return (
    <Page
      about={pageHead('importDigits')}
      head={
        <>
          <h1>Import a table of digits</h1>
          <p className="mt-2 max-w-prose text-soft">Each readable line becomes a draft claim of yours, which you look through and submit. Nothing is drafted before you have seen what the file brings.</p>
        </>
      }
      margin={<Columns />}
    >
      <FileDrop label={fileName ? 'Another file' : 'The table'} hint="A CSV file in UTF-8, at most 2,000 lines." accept=".csv,text/csv" onFile={onFile} />
      {busy && <Loading what="Reading the table" />}
      {error && <ErrorView error={error} title="The file was not taken." />}
      {result && fileName && <Done result={result} fileName={fileName} />}
      {!result && preview && !busy && (
        <Section title={`What ${fileName ?? 'the file'} brings`} className="mt-9">
          {preview.lines.length === 0 ? <Empty title="The file has no lines." /> : <Table caption="Lines of the file" columns={COLUMNS} rows={preview.lines} rowKey={({ line }) => String(line)} />}
          <p className="mt-5">
            <Button tone="act" onClick={onImport} disabled={good === 0}>
              {good === 1 ? 'Draft 1 claim' : `Draft ${good} claims`}
            </Button>
          </p>
        </Section>
      )}
    </Page>
  )
}

function Columns() {
  return (
    <MarginNote title="Columns">
      <p>The first line names them, in any order:</p>
      <ul className="mt-2 grid gap-2">
        <li><em>definition</em>: a register number, or words such as “odd, k = 3”, “1/(p log p)”, “squarefree, k = 2”</li>
        <li><em>digits</em>: as printed</li>
        <li><em>reading</em>: truncated or rounded</li>
        <li><em>source</em>: where they are printed</li>
      </ul>
    </MarginNote>
  )
}

function Done({ result, fileName }: { result: ImportResult; fileName: string }) {
  return (
    <Notice tone="done" title={`${result.drafts.length} ${result.drafts.length === 1 ? 'claim' : 'claims'} drafted from ${fileName}.`} className="mt-7" live>
      <p>
        They wait on <TextLink to={paths.desk()}>your desk</TextLink> to be looked through and submitted:{' '}
        {result.drafts.map(({ claimId, constant, line }, index) => (
          <span key={claimId}>
            {index > 0 && ', '}
            <TextLink to={paths.claim(claimId)}>{constant}</TextLink> (line {line})
          </span>
        ))}
        .
      </p>
      {result.left.length > 0 && <p className="mt-2">Left out: {result.left.map(({ line, message }) => `line ${line}: ${message}`).join(' ')}</p>}
    </Notice>
  )
}
