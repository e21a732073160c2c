import { Worker } from 'node:worker_threads'
import type { Certificate } from '../../shared/engine/certificate/certificate.ts'
import type { Repetition } from '../../shared/engine/certificate/repeat.ts'

const compiled = !import.meta.url.endsWith('.ts')

function startWorker(certificate: Certificate): Worker {
  if (compiled) return new Worker(new URL('./repeat-thread.js', import.meta.url), { workerData: { certificate } })
  const entry = new URL('./repeat-thread.ts', import.meta.url).href
  return new Worker(new URL('../engine/thread-entry.mjs', import.meta.url), { execArgv: [], workerData: { entry, certificate } })
}

/**
 * Repeats a certificate in a thread of its own that is ended after `minutes`; null where it was. Parameters are free within their
 * ranges, so that a forged file can ask for days of work, and no one part of it need ever finish.
 */
export async function repeatWithin(minutes: number, certificate: Certificate, onProgress?: (share: number) => void): Promise<Repetition | null> {
  const worker = startWorker(certificate)
  let limit: NodeJS.Timeout | undefined
  try {
    return await new Promise<Repetition | null>((resolve, reject) => {
      limit = setTimeout(() => resolve(null), minutes * 60_000)
      worker.on('error', reject)
      worker.on('message', (message: { share: number } | { repetition: Repetition }) => {
        if ('repetition' in message) resolve(message.repetition)
        else onProgress?.(message.share)
      })
    })
  } finally {
    clearTimeout(limit)
    await worker.terminate()
  }
}
