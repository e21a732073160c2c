import { hasRight } from '../../shared/permissions.ts'
import type { Run as RunView } from '../../shared/schemas/run.ts'
import { forbidden, notFound } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'

/** What a policy needs to know of a run. */
export interface RunFacts {
  groupId: string
  startedBy: string
  state: RunView['state']
  purpose: RunView['purpose']
}

/** A run is open to whoever started it and to those of its group who read the group's work. */
export function canReadRun(reader: SignedInMember, run: RunFacts): boolean {
  return run.startedBy === reader.id || (run.groupId === reader.groupId && hasRight(reader.roles, 'group-work.read'))
}

export function assertCanReadRun(reader: SignedInMember, run: RunFacts | null | undefined): asserts run is RunFacts {
  if (!run || !canReadRun(reader, run)) throw notFound('run')
}

/** Stopping and resuming is for whoever started it; a lead may do it for the group. */
function handles(reader: SignedInMember, run: RunFacts): boolean {
  return run.startedBy === reader.id || (run.groupId === reader.groupId && hasRight(reader.roles, 'claims.decide'))
}

export function assertHandlesRun(reader: SignedInMember, run: RunFacts): void {
  if (!handles(reader, run)) throw forbidden('not_your_run', 'Only whoever started this run, or a lead of the group, may do this.')
}

/** What this reader may do with the run now: the client shows it, the commands check it again. */
export function runAbilities(reader: SignedInMember, run: RunFacts): RunView['abilities'] {
  return {
    stop: handles(reader, run) && (run.state === 'queued' || run.state === 'running'),
    resume: handles(reader, run) && (run.state === 'stopped' || run.state === 'failed'),
    registerClaim: run.state === 'done' && run.purpose === 'run' && run.groupId === reader.groupId && hasRight(reader.roles, 'research'),
  }
}
