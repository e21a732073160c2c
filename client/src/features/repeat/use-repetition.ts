import { useEffect, useRef, useState } from 'react'
import type { Certificate } from '../../../../shared/engine/certificate/certificate.ts'
import type { Repetition } from '../../../../shared/engine/certificate/repeat.ts'
import type { RepeatAnswer } from './messages.ts'

export type RepetitionState =
  | { status: 'idle' }
  /** `share` is null until the engine has told how far it is. */
  | { status: 'running'; share: number | null; startedAt: number }
  | { status: 'stopped' }
  | { status: 'done'; repetition: Repetition; seconds: number }
  | { status: 'failed'; message: string }

/** Makes the worker; tests put another in its place. */
export type StartWorker = () => Worker

const startWorker: StartWorker = () => new Worker(new URL('./worker.ts', import.meta.url), { type: 'module', name: 'repeat' })

/** Repeats a certificate in a worker of its own, which ends with the page or when it is stopped. */
export function useRepetition(certificate: Certificate, start: StartWorker = startWorker): { state: RepetitionState; run: () => void; stop: () => void } {
  const [state, setState] = useState<RepetitionState>({ status: 'idle' })
  const worker = useRef<Worker | null>(null)
  const end = () => {
    worker.current?.terminate()
    worker.current = null
  }
  useEffect(() => end, [])

  const run = () => {
    end()
    const startedAt = Date.now()
    setState({ status: 'running', share: null, startedAt })
    const started = start()
    worker.current = started
    started.onmessage = ({ data }: MessageEvent<RepeatAnswer>) => {
      if (data.kind === 'progress') return setState({ status: 'running', share: data.share, startedAt })
      end()
      if (data.kind === 'done') setState({ status: 'done', repetition: data.repetition, seconds: (Date.now() - startedAt) / 1_000 })
      else setState({ status: 'failed', message: data.message })
    }
    started.onerror = (event) => {
      end()
      setState({ status: 'failed', message: event.message || 'The program could not be fetched.' })
    }
    started.postMessage({ certificate })
  }
  return {
    state,
    run,
    stop: () => {
      end()
      setState({ status: 'stopped' })
    },
  }
}
