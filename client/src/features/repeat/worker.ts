import { repeatCertificate } from '../../../../shared/engine/certificate/repeat.ts'
import type { RepeatAnswer, RepeatRequest } from './messages.ts'

/** Repeats a certificate beside the page, so that the page stays quick and can end it at once by ending the worker. */

const answer = (message: RepeatAnswer) => self.postMessage(message)

self.addEventListener('message', ({ data: { certificate } }: MessageEvent<RepeatRequest>) => {
  // The engine tells every finished part; the page needs to hear a hundred of them.
  let told = 0
  repeatCertificate(certificate, (share) => {
    if (share - told < 0.01 && share < 1) return
    told = share
    answer({ kind: 'progress', share })
  }).then(
    (repetition) => answer({ kind: 'done', repetition }),
    (error: unknown) => answer({ kind: 'failed', message: error instanceof Error ? error.message : String(error) }),
  )
})
