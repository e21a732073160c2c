import { pageHead } from '../../../../shared/page-head.ts'
import type { Run, RunEvent } from '../../../../shared/schemas/run.ts'
import { paths } from '../../app/paths.ts'
import { Formula } from '../../components/formula/formula.tsx'
import { Button } from '../../components/ui/button.tsx'
import { ErrorView, Loading } from '../../components/ui/feedback.tsx'
import { TextLink } from '../../components/ui/link.tsx'
import { Notice } from '../../components/ui/notice.tsx'
import { Page } from '../../components/ui/page.tsx'
import { RunMargin } from '../../features/runs/components/run-margin.tsx'
import { OutcomeEnclosure, RunOutcome } from '../../features/runs/components/run-outcome.tsx'
import { RunProgress } from '../../features/runs/components/run-progress.tsx'
import { RUN_STATE_WORDS } from '../../features/runs/run-words.ts'
import { problemOf } from '../../lib/errors.ts'

export interface RunViewProps {
  run: Run | undefined
  error: unknown
  onRetry: () => void
  /** The latest progress told by the server, while it works. */
  live: RunEvent | null
  onSteer: (act: 'stop' | 'resume') => void
  steering: 'stop' | 'resume' | null
  steerError: unknown
  onDraft: (remark: string) => Promise<unknown>
}

export function RunView({ run, error, onRetry, live, onSteer, steering, steerError, onDraft }: RunViewProps) {
  if (!run)
    return (
      <Page about={pageHead('run')} head={<h1>Run</h1>}>
        {error ? <ErrorView title="This run could not be read" error={error} onRetry={onRetry} /> : <Loading what="Reading the run" />}
      </Page>
    )
  const state = live?.state ?? run.state
  return (
    <Page
      about={pageHead('run', `Run of ${run.constant}`)}
      head={
        <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
          <h1>
            {run.purpose === 'recheck' ? 'Recheck' : 'Run'} of <TextLink to={paths.constant(run.constant)}>{run.constant}</TextLink>
          </h1>
          <p className="text-[1.15rem]">{RUN_STATE_WORDS[state]}</p>
        </div>
      }
      margin={<RunMargin run={run} />}
    >
      <div className="entry">
        <Formula display latex={run.definition.latex} text={run.definition.text} />
        {(state === 'queued' || state === 'running') && <RunProgress run={run} live={live} />}
        {run.outcome && <OutcomeEnclosure outcome={run.outcome} goal={run.goal} />}
      </div>
      <div className="mt-5 grid justify-items-start gap-4">
        {run.abilities.stop && (state === 'queued' || state === 'running') && (
          <Button onClick={() => onSteer('stop')} busy={steering === 'stop' && 'Stopping …'}>
            Stop the run
          </Button>
        )}
        {run.state === 'failed' && (
          <Notice tone="refused" title="It failed.">
            {run.failure ?? 'No reason was given.'}
          </Notice>
        )}
        {run.state === 'stopped' && (
          <Notice tone="plain" title="Stopped.">
            What is finished is kept: {run.shards ? `${run.shards.done} of ${run.shards.total} parts. ` : ''}Resumed, it goes on from there.
          </Notice>
        )}
        {run.abilities.resume && (
          <Button tone="act" onClick={() => onSteer('resume')} busy={steering === 'resume' && 'Resuming …'}>
            Resume the run
          </Button>
        )}
        {steerError ? (
          <Notice tone="refused" title="Nothing was changed." live>
            {problemOf(steerError).detail}
          </Notice>
        ) : null}
      </div>
      {run.outcome && <RunOutcome run={run} outcome={run.outcome} onDraft={onDraft} />}
    </Page>
  )
}
