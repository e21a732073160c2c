import type { Certificate } from '../../../../../shared/engine/certificate/certificate.ts'
import { Button } from '../../../components/ui/button.tsx'
import { Progress } from '../../../components/ui/feedback.tsx'
import { Notice } from '../../../components/ui/notice.tsx'
import { secondsInWords } from '../../../components/ui/time.tsx'
import { ENGINE_RELEASE } from '../engine-release.ts'
import { useRepetition } from '../use-repetition.ts'
import type { RepetitionState, StartWorker } from '../use-repetition.ts'

interface RepetitionProps {
  certificate: Certificate
  startWorker?: StartWorker
}

/** Repeats a certificate on the reader's own machine, with progress, and says whether it repeats. */
export function RepetitionPanel({ certificate, startWorker }: RepetitionProps) {
  const { state, run, stop } = useRepetition(certificate, startWorker)
  const running = state.status === 'running'
  return (
    <div className="grid gap-4">
      {!running && (
        <p>
          <Button tone={state.status === 'idle' ? 'act' : 'plain'} onClick={run}>
            {state.status === 'idle' ? 'Repeat it in this browser' : 'Repeat it once more'}
          </Button>
        </p>
      )}
      {running && (
        <div className="grid max-w-xl gap-3">
          <Progress share={state.share} label="Share of the computation that is repeated" />
          <p className="flex flex-wrap items-center gap-x-5 gap-y-2">
            <span role="status">{state.share === null ? 'Starting …' : `${Math.floor(state.share * 100)} % repeated here`}</span>
            <Button onClick={stop}>Stop</Button>
          </p>
        </div>
      )}
      <Verdict state={state} certificate={certificate} />
    </div>
  )
}

function Verdict({ state, certificate }: { state: RepetitionState; certificate: Certificate }) {
  if (state.status === 'stopped')
    return <Notice tone="plain" title="Stopped." live>Nothing is kept of a repetition that was not finished; it begins anew.</Notice>
  if (state.status === 'failed')
    return <Notice tone="refused" title="The repetition broke off." live>{state.message} That says nothing about the certificate. Try again, or repeat it from the command line.</Notice>
  if (state.status !== 'done') return null
  const { repetition: { repeats, intact, findings }, seconds } = state
  const took = `It took ${secondsInWords(seconds)} on this machine.`
  if (repeats && intact)
    return (
      <Notice tone="done" title="It repeats." live>
        Enclosure, error budget and estimates came out the same to the last digit, computed in this browser from the certificate alone. {took}
      </Notice>
    )
  return (
    <Notice tone="refused" title={repeats ? 'The enclosure repeats, but the file was changed.' : 'It does not repeat.'} live>
      <ul className="mt-1 list-disc pl-5 break-words">
        {findings.map((finding) => (
          <li key={finding}>{finding}</li>
        ))}
      </ul>
      <p className="mt-2">
        {certificate.engine.digest !== ENGINE_RELEASE.digest && !repeats && `It was made by release ${certificate.engine.version} of the engine and repeated by another (${ENGINE_RELEASE.version}), which may choose its steps otherwise: repeat it with that release before you judge. `}
        Take the certificate anew from its claim; if that one does not repeat either, tell the group that signed it. {took}
      </p>
    </Notice>
  )
}
