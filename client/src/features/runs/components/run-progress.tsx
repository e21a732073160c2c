import type { Run, RunEvent } from '../../../../../shared/schemas/run.ts'
import { DigitLine } from '../../../components/digit-line/digit-line.tsx'
import { Progress } from '../../../components/ui/feedback.tsx'
import { secondsInWords } from '../../../components/ui/time.tsx'

/** How far a run is, how long it still takes, and the enclosure so far where the method has one before the end. */
export function RunProgress({ run, live }: { run: Run; live: RunEvent | null }) {
  const { state, progress, shards, secondsLeft, cpuSeconds } = live ?? run
  const facts = [
    state === 'queued' ? 'waiting for a worker' : `${Math.floor(progress * 100)} % done`,
    shards && `${shards.done} of ${shards.total} parts`,
    secondsLeft !== null && state === 'running' && `about ${secondsInWords(secondsLeft)} left`,
    cpuSeconds > 0 && `${secondsInWords(cpuSeconds)} of CPU time so far`,
  ].filter(Boolean)
  return (
    <div className="mt-4">
      <Progress share={state === 'queued' ? null : progress} label="Share of the run that is done" />
      <p className="mt-2">{facts.join(' · ')}</p>
      {live?.enclosure && (
        <div className="mt-3">
          <DigitLine lo={live.enclosure.lo} hi={live.enclosure.hi} size="large" />
          <p className="text-[0.92rem] text-soft">The enclosure so far; it narrows as the run proceeds.</p>
        </div>
      )}
    </div>
  )
}
