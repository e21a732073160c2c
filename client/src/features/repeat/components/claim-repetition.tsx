import { useQuery } from '@tanstack/react-query'
import { fetched, Part } from '../../../components/ui/fetched.tsx'
import { claimCertificateQuery } from '../queries.ts'
import { CertificateInspection } from './certificate-inspection.tsx'

/** For the page of a claim: its certificate, checked and repeated on the reader's own machine. */
export function ClaimRepetition({ claimId }: { claimId: string }) {
  const certificate = useQuery(claimCertificateQuery(claimId))
  return <Part of={fetched(certificate)} what="the certificate">{(data) => <CertificateInspection key={data.digest} certificate={data} />}</Part>
}
