import { parentPort, workerData } from 'node:worker_threads'
import type { Certificate } from '../../shared/engine/certificate/certificate.ts'
import { repeatCertificate } from '../../shared/engine/certificate/repeat.ts'

/* The thread of `repeatWithin`: repeats one certificate, tells each finished part, and answers with what came of it. */

const { certificate } = workerData as { certificate: Certificate }

parentPort!.postMessage({ repetition: await repeatCertificate(certificate, (share) => parentPort!.postMessage({ share })) })
