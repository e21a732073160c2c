import { pageHead } from '../../../../shared/page-head.ts'
import type { Certificate } from '../../../../shared/engine/certificate/certificate.ts'
import { paths } from '../../app/paths.ts'
import { FileDrop } from '../../components/ui/file-drop.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { MarginNote, Page, Section } from '../../components/ui/page.tsx'
import { CertificateFacts, CertificateGrounds, CertificateSubject } from '../../features/repeat/components/certificate-facts.tsx'
import { CertificateInspection } from '../../features/repeat/components/certificate-inspection.tsx'

/** What was dropped, and what could be read of it. */
export type Dropped = { name: string; certificate: Certificate } | { name: string; problem: string }

interface VerifyViewProps {
  dropped: Dropped | null
  onFile: (file: File) => void
}

/** Anyone drops a certificate; their own browser checks and repeats it. */
export function VerifyView({ dropped, onFile }: VerifyViewProps) {
  const certificate = dropped && 'certificate' in dropped ? dropped.certificate : null
  return (
    <Page
      about={pageHead('verify')}
      head={
        <>
          <h1>Verify a certificate</h1>
          <p className="mt-2 max-w-prose text-soft">Your own machine repeats the enclosure from the file alone. The file stays in your browser: nothing of it is sent.</p>
        </>
      }
      margin={
        <>
          {certificate && (
            <MarginNote title="From the file">
              <CertificateFacts certificate={certificate} />
            </MarginNote>
          )}
          <MarginNote title="What this shows">
            <p>
              That the computation gives this enclosure, and that the file is as it was made. Whether the bounds are sound is for their proofs and sources to show:{' '}
              <TextLink to={paths.about()}>how it is certified</TextLink>.
            </p>
          </MarginNote>
          <MarginNote title="From the command line">
            <p>
              <code>npm run -s verify -- certificate.json</code> does the same, and ends with code 1 where the file does not hold.
            </p>
          </MarginNote>
        </>
      }
    >
      <FileDrop
        label={certificate ? 'Another certificate' : 'The certificate'}
        hint="Drop the JSON file here, or choose it. It is downloaded from the page of a claim or of a run."
        accept=".json,application/json"
        onFile={onFile}
      />
      {dropped && 'problem' in dropped && (
        <Notice tone="refused" title={`${dropped.name} can’t be read as a certificate.`} className="mt-5" live>
          {dropped.problem}
        </Notice>
      )}
      {dropped && certificate && (
        <div key={dropped.name + certificate.digest} className="mt-9">
          <Section title={dropped.name}>
            <CertificateSubject certificate={certificate} />
          </Section>
          <Section title="Checks">
            <CertificateInspection key={JSON.stringify(certificate)} certificate={certificate} />
          </Section>
          <Section title="What the radius is made of">
            <CertificateGrounds certificate={certificate} />
          </Section>
        </div>
      )}
    </Page>
  )
}
