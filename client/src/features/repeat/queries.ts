import { queryOptions } from '@tanstack/react-query'
import type { Certificate } from '../../../../shared/engine/certificate/certificate.ts'
import type { PublicKey } from '../../../../shared/schemas/group.ts'
import { readCertificate } from '../../../../shared/schemas/certificate.ts'
import { api } from '../../lib/api-client.ts'
import { ApiError } from '../../lib/errors.ts'
import { checkDigest, checkSignature } from './signature-check.ts'

/** The certificate of a claim, read as strictly as one from a file. */
export const claimCertificateQuery = (claimId: string) =>
  queryOptions({
    queryKey: ['certificate', claimId],
    queryFn: async ({ signal }) => {
      const read = readCertificate(JSON.stringify(await api.get<unknown>(`/claims/${claimId}/certificate`, { signal })))
      if ('problem' in read) throw new ApiError({ status: 0, code: 'not_a_certificate', detail: read.problem })
      return read.certificate
    },
    staleTime: Infinity,
  })

export const digestCheckQuery = (certificate: Certificate) =>
  queryOptions({ queryKey: ['digest-check', JSON.stringify(certificate)], queryFn: () => checkDigest(certificate), staleTime: Infinity })

export const signatureCheckQuery = (certificate: Certificate, keys: PublicKey[] | undefined) =>
  queryOptions({
    queryKey: ['signature-check', certificate.digest, certificate.signature?.value, keys?.map(({ id }) => id)],
    queryFn: () => checkSignature(certificate, keys ?? []),
    enabled: keys !== undefined,
    staleTime: Infinity,
  })
