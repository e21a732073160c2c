import type { Constant } from '../../../../../shared/schemas/constant.ts'
import { paths } from '../../../app/paths.ts'
import { CopyText } from '../../../components/ui/copy-text.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Facts, MarginNote } from '../../../components/ui/page.tsx'
import { Time } from '../../../components/ui/time.tsx'

/** Where a constant comes from, on what its signed enclosures rest, what rests on it, and how to cite it. */
export function ConstantMargin({ constant }: { constant: Constant }) {
  return (
    <>
      {constant.best && (
        <MarginNote title="Certified digits">
          <Facts
            facts={[
              ['truncated', `${constant.best.digits.truncated} after the point`],
              ['rounded', `${constant.best.digits.rounded} after the point`],
            ]}
          />
          <p className="mt-1 text-soft">The best enclosure is the exact intersection of all that are signed.</p>
        </MarginNote>
      )}
      <MarginNote title="Provenance">
        <Facts
          facts={[
            ...(constant.definition.aliases.length > 0 ? [['Also called', constant.definition.aliases.join(', ')] as [string, string]] : []),
            ['Stated by', constant.statedBy],
            ['Group', constant.group.name],
            ['On', <Time key="stated" at={constant.statedAt} />],
            ['Last change', <Time key="changed" at={constant.changedAt} />],
          ]}
        />
      </MarginNote>
      <MarginNote title="Rests on">
        {constant.restsOn.length === 0 ? (
          <p>{constant.best ? 'No published estimate: every bound is proven in the engine.' : 'Nothing yet.'}</p>
        ) : (
          <ul className="grid gap-1">
            {constant.restsOn.map((use) => (
              <li key={use.estimate}>
                {use.title}
                {use.conditional && <span className="text-undecided"> (conditional)</span>}
              </li>
            ))}
          </ul>
        )}
      </MarginNote>
      {constant.usedBy.length > 0 && (
        <MarginNote title="Used by">
          <ul className="grid gap-1">
            {constant.usedBy.map((use) => (
              <li key={use.claimNumber}>
                <TextLink to={paths.claim(use.claimNumber)}>{use.claimNumber}</TextLink>: {use.text}
              </li>
            ))}
          </ul>
        </MarginNote>
      )}
      <CiteNote cite={constant.cite} />
    </>
  )
}

/** How to cite an entry of the register, to read and to copy. */
export function CiteNote({ cite }: { cite: { plain: string; bibtex: string } }) {
  return (
    <MarginNote title="To cite it">
      <p className="break-words">{cite.plain}</p>
      <p className="mt-1 flex flex-wrap gap-x-4">
        <CopyText label="Copy text" text={cite.plain} />
        <CopyText label="Copy BibTeX" text={cite.bibtex} />
      </p>
    </MarginNote>
  )
}
