import { paths } from '../../../app/paths.ts'
import { StateMark } from '../../../components/state-mark/state-mark.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Table } from '../../../components/ui/table.tsx'
import type { EstimateDoubt } from '../../../../../shared/schemas/estimate.ts'
import { FATES, ofFate, type RestingClaim } from '../doubt-words.ts'

/** Every claim of the group that rests on an estimate, by what a doubt does to it. */
export function RestingClaims({ doubt }: { doubt: EstimateDoubt }) {
  return (
    <div className="grid gap-7">
      {FATES.map(([fate, title, tells]) => {
        const claims = ofFate(doubt, fate)
        return (
          claims.length > 0 && (
            <div key={fate}>
              <h3>
                {title} <span className="text-soft">({claims.length})</span>
              </h3>
              <p className="mb-2 text-[0.92rem] text-soft">{tells}</p>
              <ClaimTable caption={title} claims={claims} />
            </div>
          )
        )
      })}
    </div>
  )
}

function ClaimTable({ caption, claims }: { caption: string; claims: RestingClaim[] }) {
  return (
    <Table
      caption={caption}
      rows={claims}
      rowKey={({ id }) => id}
      columns={[
        { key: 'number', header: 'Claim', plain: true, className: 'md:whitespace-nowrap', cell: (claim) => <TextLink to={paths.claim(claim)}>{claim.number}</TextLink> },
        {
          key: 'about',
          header: 'About',
          plain: true,
          cell: ({ text, through }) => (
            <>
              {text}
              {through.length > 0 && <span className="block text-[0.92rem] text-soft">rests on it through {through.join(' and ')}</span>}
            </>
          ),
        },
        { key: 'state', header: 'State', className: 'md:whitespace-nowrap', cell: ({ state }) => <StateMark state={state} /> },
        { key: 'author', header: 'Author', className: 'lg:whitespace-nowrap', cell: ({ author }) => author.name },
      ]}
    />
  )
}
