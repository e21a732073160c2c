import type { ReactNode } from 'react'
import { estimateHead, pageHead } from '../../../../shared/page-head.ts'
import type { Estimate } from '../../../../shared/schemas/estimate.ts'
import { paths } from '../../app/paths.ts'
import { Formula } from '../../components/formula/formula.tsx'
import { Printed } from '../../components/formula/printed.tsx'
import { Empty } from '../../components/ui/feedback.tsx'
import { Part } from '../../components/ui/fetched.tsx'
import type { Fetched } from '../../components/ui/fetched.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Facts, MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { Table } from '../../components/ui/table.tsx'
import { LiftedDoubts, OpenDoubts } from '../../features/estimates/components/doubt-notices.tsx'
import { EstimateState } from '../../features/estimates/components/estimate-state.tsx'

/** One published inequality: what it says, where it holds, where it stands, and who rests on it. */
export function EstimateView({ estimate, forLead }: { estimate: Fetched<Estimate>; forLead?: ReactNode }) {
  const { data } = estimate
  return (
    <Page
      about={data ? estimateHead(data) : pageHead('estimate')}
      head={
        <>
          <p className="mb-1">
            <TextLink to={paths.estimates()}>Estimates</TextLink>
          </p>
          <h1>{data ? <Printed text={data.title} /> : 'Estimate'}</h1>
        </>
      }
      margin={data && <EstimateMargin estimate={data} />}
    >
      <Part of={estimate} what="the estimate">{(each) => <EstimateBody estimate={each} forLead={forLead} />}</Part>
    </Page>
  )
}

function EstimateBody({ estimate, forLead }: { estimate: Estimate; forLead: ReactNode }) {
  return (
    <>
      <div className="text-[1.2rem]">
        <Formula display latex={estimate.statementLatex} text={estimate.statement} />
      </div>
      <p className="mt-2">
        for <Printed text={estimate.validFor} />
        {estimate.conditional ? `, if ${estimate.condition ?? 'an unproved hypothesis holds'}` : ', unconditionally'}.
      </p>
      {estimate.conditional && (
        <Notice tone="undecided" title="Conditional." className="mt-5">
          An enclosure that uses it holds only if {estimate.condition ?? 'the hypothesis'} does; the certificate says so.
        </Notice>
      )}
      <OpenDoubts doubts={estimate.doubts} />
      {forLead}
      <Section title="Source">
        <p className="max-w-prose"><Printed text={estimate.source} />.</p>
      </Section>
      <Section title="What was checked">
        <p className="max-w-prose"><Printed text={estimate.checked} /></p>
        <p className="mt-2 max-w-prose text-soft">A numerical check can find a slip of the pen; it proves nothing beyond its reach. The inequality is as sound as its source.</p>
      </Section>
      <LiftedDoubts doubts={estimate.doubts} />
      <Section
        title="Signed claims that rest on it"
        beside={estimate.uses > estimate.usedBy.length && `the latest ${estimate.usedBy.length} of ${estimate.uses}`}
      >
        {estimate.usedBy.length === 0 ? (
          <Empty title="No claim in force rests on it.">
            <p>When a claim is signed whose certificate uses this estimate, it is listed here with the point at which the estimate was used.</p>
          </Empty>
        ) : (
          <Table
            caption="Signed claims that rest on this estimate"
            rows={estimate.usedBy}
            rowKey={({ claimNumber }) => claimNumber}
            columns={[
              { key: 'claim', header: 'Claim', cell: ({ claimNumber }) => <TextLink to={paths.claim(claimNumber)}>{claimNumber}</TextLink> },
              { key: 'at', header: 'Used at', cell: ({ usedAt }) => <Printed text={usedAt} /> },
            ]}
          />
        )}
      </Section>
    </>
  )
}

function EstimateMargin({ estimate }: { estimate: Estimate }) {
  return (
    <>
      <MarginNote title="In short">
        <Facts
          facts={[
            ['State', <EstimateState key="state" estimate={estimate} />],
            ['Holds for', <Printed key="range" text={estimate.validFor} />],
            ['Conditional', estimate.conditional ? 'yes' : 'no'],
            ['Plain text', <span key="text" className="break-words">{estimate.statement}</span>],
          ]}
        />
      </MarginNote>
      <MarginNote title="As certificates cite it">
        <code className="break-all">{estimate.id}</code>
      </MarginNote>
    </>
  )
}
