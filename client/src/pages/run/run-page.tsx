import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useNavigate, useParams } from 'react-router-dom'
import { files, paths } from '../../app/paths.ts'
import { useDraftClaim } from '../../features/claims/queries.ts'
import { runKeys, runQuery, useSteerRun } from '../../features/runs/queries.ts'
import { useRunEvents } from '../../features/runs/use-run-events.ts'
import { RunView } from './run-view.tsx'

export function RunPage() {
  const { id = '' } = useParams()
  const client = useQueryClient()
  const navigate = useNavigate()
  const run = useQuery(runQuery(id))
  const active = run.data?.state === 'queued' || run.data?.state === 'running'
  const live = useRunEvents(files.runEvents(id), active, () => void client.invalidateQueries({ queryKey: runKeys.all }))
  const steer = useSteerRun(id)
  const draft = useDraftClaim()
  return (
    <RunView
      run={run.data}
      error={run.error}
      onRetry={() => void run.refetch()}
      live={live}
      onSteer={(act) => steer.mutate(act)}
      steering={steer.isPending ? steer.variables : null}
      steerError={steer.error}
      onDraft={async (remark) => {
        const claim = await draft.mutateAsync({ kind: 'enclosure', runId: id, remark })
        await navigate(paths.claim(claim))
      }}
    />
  )
}
