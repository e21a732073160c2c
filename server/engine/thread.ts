import { parentPort } from 'node:worker_threads'
import { canonicalJson } from '../../shared/engine/certificate/canonical-json.ts'
import { makeCertificate } from '../../shared/engine/certificate/certificate.ts'
import { prepare } from '../../shared/engine/engine.ts'
import { EngineRefusal } from '../../shared/engine/errors.ts'
import type { Computation, ComputationRequest, Json } from '../../shared/engine/methods/computation.ts'
import type { AnswerMessage, Answers, Task, TaskError, TaskMessage } from './messages.ts'
import { measureSpeed } from './sample.ts'
import { threadCpuMs } from './thread-cpu.ts'

/* A thread that computes: takes one task at a time and answers it. It knows no database and no clock but its own CPU time. */

/** Runs whose preparation (tables, nodes) is kept for the next shard; the oldest is dropped. */
const KEPT = 2
const prepared = new Map<string, Promise<Computation>>()

function computationOf(run: string, request: ComputationRequest): Promise<Computation> {
  const known = prepared.get(run)
  prepared.delete(run)
  const computation = known ?? prepare(request)
  prepared.set(run, computation)
  if (prepared.size > KEPT) prepared.delete([...prepared.keys()][0])
  return computation
}

async function answer(task: Task): Promise<Answers[Task['kind']]> {
  switch (task.kind) {
    case 'prepare': {
      const computation = await computationOf(task.run, task.request)
      const costs = Array.from({ length: computation.shardCount }, (_, index) => computation.shardCost(index))
      return { parameters: computation.parameters, costs, interim: computation.interim !== undefined }
    }
    case 'shard': {
      const computation = await computationOf(task.run, task.request)
      return JSON.stringify(await computation.runShard(task.index))
    }
    case 'interim': {
      const computation = await computationOf(task.run, task.request)
      const results = task.results.map((result) => (result === null ? undefined : JSON.parse(result)))
      return (await computation.interim?.(results))?.[0] ?? null
    }
    case 'combine': {
      const computation = await computationOf(task.run, task.request)
      const [outcome] = await computation.combine(task.results.map((result) => JSON.parse(result)))
      const certificate = await makeCertificate(outcome, task.release)
      return { outcome, certificate: canonicalJson(certificate as unknown as Json), certificateDigest: certificate.digest }
    }
    case 'calibrate':
      return await measureSpeed(threadCpuMs)
  }
}

function told(error: unknown): TaskError {
  if (error instanceof EngineRefusal) return { kind: 'refusal', code: error.code, field: error.field, message: error.message }
  const { message, stack = '' } = error instanceof Error ? error : new Error(String(error))
  return { kind: 'fault', message, stack }
}

const port = parentPort
if (port === null) throw new Error('this module is the start of a thread')
port.on('message', async ({ id, task }: TaskMessage) => {
  const begun = threadCpuMs()
  const done = (rest: { ok: true; value: Answers[Task['kind']] } | { ok: false; error: TaskError }): AnswerMessage => ({ id, cpuMs: Math.ceil(threadCpuMs() - begun), ...rest })
  try {
    port.postMessage(done({ ok: true, value: await answer(task) }))
  } catch (error) {
    // A preparation that failed must not be taken for one that is there.
    if ('run' in task) prepared.delete(task.run)
    port.postMessage(done({ ok: false, error: told(error) }))
  }
})
