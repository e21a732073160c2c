import type { Run } from '../../../../shared/schemas/run.ts'

export const RUN_STATE_WORDS: Record<Run['state'], string> = {
  queued: 'waiting for a worker',
  running: 'working',
  done: 'done',
  failed: 'failed',
  stopped: 'stopped',
}

/** What the convergence of a method is counted in. */
export function convergenceUnit(method: Run['method']): string {
  return method === 'partial-sum' ? 'cut-off' : method === 'finite' ? 'members' : 'nodes'
}
