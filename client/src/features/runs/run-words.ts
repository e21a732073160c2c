import type { Run } from '../../../../shared/schemas/run.ts'

export const RUN_STATE_WORDS: Record<Run['state'], string> = {
  queued: 'waiting for a worker',
  running: 'working',
  done: 'done',
  failed: 'failed',
  stopped: 'stopped',
}

/** What a run is to reach, in words. */
export function goalWords(goal: Run['goal']): string {
  return 'digits' in goal ? `${goal.digits} digit${goal.digits === 1 ? '' : 's'}` : `terms up to ${goal.cutoff}`
}

/** What the convergence of a method is counted in. */
export function convergenceUnit(method: Run['method']): string {
  return method === 'partial-sum' ? 'cut-off' : method === 'finite' ? 'members' : 'nodes'
}
