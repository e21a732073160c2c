import type { Certificate } from '../../../../shared/engine/certificate/certificate.ts'
import type { Repetition } from '../../../../shared/engine/certificate/repeat.ts'

/** To the worker: repeat this. One worker repeats one certificate. */
export interface RepeatRequest {
  certificate: Certificate
}

/** From the worker: how far it is, and at the end what came of it. */
export type RepeatAnswer = { kind: 'progress'; share: number } | { kind: 'done'; repetition: Repetition } | { kind: 'failed'; message: string }
