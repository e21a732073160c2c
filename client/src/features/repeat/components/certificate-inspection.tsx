import { useQuery } from '@tanstack/react-query'
import type { Certificate } from '../../../../../shared/engine/certificate/certificate.ts'
import { keysQuery } from '../../keys/queries.ts'
import { digestCheckQuery, signatureCheckQuery } from '../queries.ts'
import { CertificateChecks } from './certificate-checks.tsx'
import { RepetitionPanel } from './repetition.tsx'

/** Everything that a reader's own browser can find out about a certificate. Give it the certificate's digest as its key. */
export function CertificateInspection({ certificate }: { certificate: Certificate }) {
  const keys = useQuery(keysQuery())
  const intact = useQuery(digestCheckQuery(certificate))
  const signature = useQuery(signatureCheckQuery(certificate, keys.data))
  return (
    <div className="grid gap-6">
      <CertificateChecks certificate={certificate} intact={intact.data} signature={signature.data} keysError={keys.error ?? signature.error} />
      <RepetitionPanel certificate={certificate} />
    </div>
  )
}
