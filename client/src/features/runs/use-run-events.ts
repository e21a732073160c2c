import { useEffect, useRef, useState } from 'react'
import { runEvent } from '../../../../shared/schemas/run.ts'
import type { RunEvent } from '../../../../shared/schemas/run.ts'

/** The browser gives up for good on some failures; then the stream is opened anew after this many milliseconds. */
const REOPEN_AFTER = 3_000

/**
 * Progress of a run by server-sent events while it is queued or working. `onEnd` is called once when it has come to an end.
 * A stream that the browser closed for good (a server that was down when it asked again) is re-created by a timer.
 */
export function useRunEvents(url: string, active: boolean, onEnd: () => void): RunEvent | null {
  const [latest, setLatest] = useState<RunEvent | null>(null)
  const end = useRef(onEnd)
  useEffect(() => {
    end.current = onEnd
  })

  useEffect(() => {
    if (!active) return
    let source: EventSource
    let timer: ReturnType<typeof setTimeout> | undefined
    const open = () => {
      source = new EventSource(url)
      source.addEventListener('progress', (message: MessageEvent<string>) => {
        const parsed = runEvent.safeParse(JSON.parse(message.data))
        if (!parsed.success) return
        setLatest(parsed.data)
        if (parsed.data.state === 'queued' || parsed.data.state === 'running') return
        source.close()
        end.current()
      })
      source.onerror = () => {
        if (source.readyState === EventSource.CLOSED) timer = setTimeout(open, REOPEN_AFTER)
      }
    }
    open()
    return () => {
      source.close()
      clearTimeout(timer)
    }
  }, [url, active])

  return active ? latest : null
}
