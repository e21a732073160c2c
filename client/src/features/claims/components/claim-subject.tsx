import type { Claim } from '../../../../../shared/schemas/claim.ts'
import { cautionWords, CONFLICT_UNSEEN, digitsWords } from '../../../../../shared/words.ts'
import { paths } from '../../../app/paths.ts'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { EndsOnPaper } from '../../../components/digit-line/ends-on-paper.tsx'
import { Formula } from '../../../components/formula/formula.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Notice } from '../../../components/ui/notice.tsx'

/** What the claim asserts, as it stands in the register, and at once whatever speaks against relying on it. */
export function ClaimSubject({ claim }: { claim: Claim }) {
  return (
    <>
      <div className="entry">
        {claim.order ? <Order order={claim.order} /> : <Formula display latex={claim.definition.latex} text={claim.definition.text} />}
        {claim.enclosure && (
          <div className="mt-3">
            <DigitLine lo={claim.enclosure.lo} hi={claim.enclosure.hi} size="large" copy />
            <EndsOnPaper {...claim.enclosure} />
          </div>
        )}
        {claim.digits && <p className="mt-2 text-[0.92rem] text-soft">{digitsWords(claim)}</p>}
      </div>
      <div className="mt-5 grid gap-4 empty:hidden">
        {claim.conflicts
          .filter((conflict) => conflict.closedAt === null)
          .map((conflict) => (
            <Notice key={conflict.claimId} tone="refused" title="In conflict.">
              No number lies in both this enclosure and that of <TextLink to={paths.claim(conflict.claim)}>{conflict.claim}</TextLink>. At least one is wrong; both are shown until one is withdrawn.
            </Notice>
          ))}
        {claim.inConflict && claim.conflicts.every(({ closedAt }) => closedAt !== null) && <Notice tone="refused" title="In conflict.">{CONFLICT_UNSEEN}</Notice>}
        {claim.kind === 'stated' && !claim.repeatedHere && (
          <Notice tone="undecided" title="Not repeated here.">
            The value is taken from its source{claim.statedValue ? `, printed there as ${claim.statedValue.digits} (${claim.statedValue.reading})` : ''}. No run of this installation meets it yet.
          </Notice>
        )}
        {claim.supersededBy && (
          <Notice tone="plain" title="Superseded.">
            <TextLink to={paths.claim(claim.supersededBy)}>{claim.supersededBy}</TextLink> is narrower. This one stays citable.
          </Notice>
        )}
        {(claim.state === 'suspended' || claim.state === 'withdrawn') && (
          <Notice tone="refused" title={claim.state === 'suspended' ? 'Suspended.' : 'Withdrawn.'}>
            {claim.history.findLast((entry) => entry.to === claim.state)?.reason ?? 'Don’t rest anything on it.'}
          </Notice>
        )}
      </div>
    </>
  )
}

function Order({ order }: { order: NonNullable<Claim['order']> }) {
  return (
    <div className="grid gap-3">
      {[order.lesser, order.greater].map((side, index) => (
        <div key={side.constant}>
          <p>
            {index === 1 && <span className="text-soft">is less than </span>}
            <TextLink to={paths.constant(side.constant)}>{side.constant}</TextLink>, {side.text}
          </p>
          <DigitLine lo={side.enclosure.lo} hi={side.enclosure.hi} size="large" />
        </div>
      ))}
    </div>
  )
}

/** The usual caution: on what the enclosure rests and which arithmetics agree. */
export function Caution({ claim }: { claim: Claim }) {
  return <p className="mt-10 max-w-prose break-inside-avoid border-t border-rule pt-3 text-[0.92rem] text-soft print:mt-4 print:max-w-none">{cautionWords(claim)}</p>
}
