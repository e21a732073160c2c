import type { Certificate } from '../../../../../shared/engine/certificate/certificate.ts'
import { readDefinition } from '../../../../../shared/engine/sets/typeset.ts'
import { goalText } from '../../../../../shared/engine/methods/goal.ts'
import { SOURCE_WORDS } from '../../../../../shared/words.ts'
import { Printed } from '../../../components/formula/printed.tsx'
import { paths } from '../../../app/paths.ts'
import { Magnitude } from '../../../components/charts/error-budget.tsx'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { Formula } from '../../../components/formula/formula.tsx'
import { TextLink } from '../../../components/ui/link.tsx'
import { Facts } from '../../../components/ui/page.tsx'
import { Table } from '../../../components/ui/table.tsx'

/** What a certificate asserts, read from the file alone. */
export function CertificateSubject({ certificate }: { certificate: Certificate }) {
  const { latex, text } = readDefinition(certificate.definition)
  return (
    <div>
      <Formula display latex={latex} text={text} />
      <div className="mt-3">
        <DigitLine {...certificate.enclosure} size="large" copy />
      </div>
    </div>
  )
}

/** How it was computed, and what each source brings to the radius. */
export function CertificateFacts({ certificate: { method, arithmetic, goal, radius, digits, engine, digest, parameters } }: { certificate: Certificate }) {
  return (
    <Facts
      facts={[
        ['Method', `${method}, ${arithmetic}`],
        ['Goal', <Printed key="goal" text={goalText(goal)} />],
        ['Radius', <Magnitude key="radius" text={radius} />],
        ['Digits', `${Math.max(0, digits.truncated)} truncated, ${Math.max(0, digits.rounded)} rounded`],
        ['Engine', `release ${engine.version}`],
        ['Parameters', Object.entries(parameters).map(([name, value]) => `${name} = ${String(value).replaceAll(',', ', ')}`).join('; ')],
        ['SHA-256', <code key="digest" className="break-all">{digest}</code>],
      ]}
    />
  )
}

/** What the radius is made of, and the estimates that it rests on. */
export function CertificateGrounds({ certificate: { budget, estimates } }: { certificate: Certificate }) {
  return (
    <div className="grid gap-8">
      <Table
        caption="Error budget"
        rows={budget.map((item, index) => ({ ...item, index }))}
        rowKey={({ index }) => String(index)}
        columns={[
          { key: 'source', header: 'Source of error', cell: ({ source }) => SOURCE_WORDS[source] },
          { key: 'magnitude', header: 'At most', cell: ({ magnitude }) => <Magnitude text={magnitude} /> },
          { key: 'bound', header: 'Bound', cell: ({ bound }) => <code>{bound}</code> },
        ]}
      />
      {estimates.length === 0 ? (
        <p className="text-soft">It uses no published estimate: every bound is proven with the engine.</p>
      ) : (
        <Table
          caption="Estimates used"
          rows={estimates}
          rowKey={({ id, usedAt }) => `${id} ${usedAt}`}
          columns={[
            { key: 'id', header: 'Estimate', cell: ({ id }) => <TextLink to={paths.estimate(id)} className="break-all">{id}</TextLink> },
            { key: 'used', header: 'Used at', cell: ({ usedAt }) => <Printed text={usedAt} /> },
            { key: 'valid', header: 'Holds for', cell: ({ validFor }) => <Printed text={validFor} /> },
            { key: 'conditional', header: 'Conditional', cell: ({ conditional }) => (conditional ? <span className="text-undecided">yes</span> : 'no') },
          ]}
        />
      )}
    </div>
  )
}
