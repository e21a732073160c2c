import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { METHOD_WORDS } from '../../../../../shared/words.ts'
import { paths } from '../../../app/paths.ts'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { claimName } from '../claim-words.ts'

type Recheck = Claim['rechecks'][number]

/** The claimed enclosure and those of the rechecks one below the other, each with the verdict whether they meet. */
export function RecheckTable({ claim, mayReadRuns }: { claim: Claim; mayReadRuns: boolean }) {
  const rows = [{ key: 'claim', recheck: null }, ...claim.rechecks.map((recheck) => ({ key: recheck.runId, recheck }))]
  return (
    <Table
      caption="The claim and its rechecks"
      rows={rows}
      rowKey={(row) => row.key}
      columns={[
        { key: 'who', header: 'Enclosure of', plain: true, cell: ({ recheck }) => (recheck ? <Who recheck={recheck} link={mayReadRuns || claim.abilities.recheck === true} /> : <strong className="font-semibold">{claimName(claim)}</strong>) },
        { key: 'how', header: 'Method', cell: ({ recheck }) => howWords(recheck ?? claim.run) },
        { key: 'value', header: 'Digits', plain: true, cell: ({ recheck }) => <Value enclosure={recheck ? recheck.enclosure : claim.enclosure} recheck={recheck} /> },
        { key: 'verdict', header: 'Verdict', cell: ({ recheck }) => recheck && <Verdict recheck={recheck} /> },
      ]}
    />
  )
}

function Who({ recheck, link }: { recheck: Recheck; link: boolean }) {
  const words = `recheck by ${recheck.startedBy?.name ?? 'a referee'}`
  return link ? <TextLink to={paths.run(recheck.runId)}>{words}</TextLink> : words
}

function howWords(run: Pick<Recheck, 'method' | 'arithmetic'> | null): string {
  return run ? `${METHOD_WORDS[run.method]}, ${run.arithmetic}` : 'from elsewhere'
}

function Value({ enclosure, recheck }: { enclosure: Claim['enclosure']; recheck: Recheck | null }) {
  if (enclosure) return <DigitLine lo={enclosure.lo} hi={enclosure.hi} limit={60} />
  if (recheck?.state === 'queued') return <span className="text-soft italic">waiting for a worker</span>
  if (recheck?.state === 'running') return <span className="text-soft italic">working, {Math.floor(recheck.progress * 100)} % done</span>
  return <span className="text-refused">{recheck?.failure ?? recheck?.state}</span>
}

function Verdict({ recheck }: { recheck: Recheck }) {
  if (recheck.verdict === null) return null
  if (recheck.verdict === 'disjoint') return <strong className="font-semibold text-refused">no number in common</strong>
  return (
    <>
      <span className="text-certain">they meet</span>
      <span className="block text-[0.88rem] text-soft">{recheck.independent ? 'independent of the claim’s run' : 'same method and arithmetic'}</span>
    </>
  )
}
