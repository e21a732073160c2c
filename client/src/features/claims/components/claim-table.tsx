import type { ClaimSummary } from '../../../../../shared/schemas/claim.ts'
import { paths } from '../../../app/paths.ts'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { StateMark } from '../../../components/state-mark/state-mark.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Table } from '../../../components/ui/table.tsx'
import { Time } from '../../../components/ui/time.tsx'
import { claimName } from '../claim-words.ts'

/** The claims for one constant. */
export function ClaimTable({ claims }: { claims: ClaimSummary[] }) {
  return (
    <Table
      caption="Claims"
      rows={claims}
      rowKey={(claim) => claim.id}
      columns={[
        { key: 'number', header: 'Claim', plain: true, cell: (claim) => <TextLink to={paths.claim(claim)} className="whitespace-nowrap">{claimName(claim)}</TextLink> },
        { key: 'value', header: 'Enclosure', plain: true, cell: (claim) => <ClaimValue claim={claim} limit={40} /> },
        { key: 'digits', header: 'Digits', align: 'right', cell: (claim) => claim.digits?.truncated ?? '' },
        {
          key: 'state',
          header: 'State',
          cell: (claim) => (
            <>
              <StateMark state={claim.state} />
              {claim.inConflict && <span className="block text-refused">in conflict</span>}
            </>
          ),
        },
        { key: 'author', header: 'Author', cell: (claim) => claim.author.name },
        { key: 'since', header: 'Since', cell: (claim) => <Time at={claim.since} /> },
      ]}
    />
  )
}

/** What a claim asserts, in one line: its digits, or an order in words. */
export function ClaimValue({ claim, limit }: { claim: ClaimSummary; limit?: number }) {
  if (claim.kind === 'order') return <>{claim.constant} is less than {claim.otherConstant}</>
  if (!claim.enclosure) return null
  return (
    <>
      <DigitLine {...claim.enclosure} {...(limit === undefined ? {} : { limit })} />
      {!claim.repeatedHere && <span className="block text-[0.88rem] text-undecided">not repeated here</span>}
    </>
  )
}
