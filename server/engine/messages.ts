import type { EngineRelease } from '../../shared/engine/certificate/certificate.ts'
import type { ComputationRequest, Outcome, Parameters } from '../../shared/engine/methods/computation.ts'

/** What a thread can be asked for. `run` names the run, so that a thread prepares it once for all its shards. */
export type Task =
  | { kind: 'prepare'; run: string; request: ComputationRequest }
  | { kind: 'shard'; run: string; request: ComputationRequest; index: number }
  /** `results`: JSON of each shard's result, in order; null where it is not there yet. */
  | { kind: 'interim'; run: string; request: ComputationRequest; results: (string | null)[] }
  | { kind: 'combine'; run: string; request: ComputationRequest; results: string[]; release: EngineRelease }
  | { kind: 'calibrate' }

/** What it answers, by the kind of task. */
export interface Answers {
  /** `interim`: whether the method can tell an enclosure on the way. */
  prepare: { parameters: Parameters; costs: number[]; interim: boolean }
  /** JSON of the shard's result. */
  shard: string
  /** Enclosure that holds already, where the method can tell one. */
  interim: { lo: string; hi: string } | null
  combine: { outcome: Outcome; certificate: string; certificateDigest: string }
  /** Speed of this machine; 1 is the reference machine. */
  calibrate: number
}

/** Why a task was not done: the engine refused, or something broke. */
export type TaskError = { kind: 'refusal'; code: string; field: string; message: string } | { kind: 'fault'; message: string; stack: string }

export interface TaskMessage {
  id: number
  task: Task
}

export type AnswerMessage = { id: number; cpuMs: number } & ({ ok: true; value: Answers[Task['kind']] } | { ok: false; error: TaskError })
