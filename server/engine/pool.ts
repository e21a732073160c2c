import { Worker } from 'node:worker_threads'
import type { AnswerMessage, Answers, Task, TaskError } from './messages.ts'

/** The engine refused or broke within a thread. */
export class TaskFailure extends Error {
  readonly reason: TaskError
  constructor(reason: TaskError) {
    super(reason.message)
    this.name = 'TaskFailure'
    this.reason = reason
  }
}

/** A thread needed more memory than it is allowed and was ended by Node. */
export class OutOfMemory extends Error {}

interface Entry {
  task: Task
  signal: AbortSignal | undefined
  resolve: (answer: { value: never; cpuMs: number }) => void
  reject: (error: unknown) => void
}

interface Thread {
  worker: Worker
  entry: Entry | null
  /** Time at which the present task was given, for those who watch a time limit. */
  since: number
}

const compiled = !import.meta.url.endsWith('.ts')

function startWorker(memoryMegabytes: number): Worker {
  const limits = { resourceLimits: { maxOldGenerationSizeMb: memoryMegabytes } }
  if (compiled) return new Worker(new URL('./thread.js', import.meta.url), limits)
  return new Worker(new URL('./thread-entry.mjs', import.meta.url), { ...limits, execArgv: [], workerData: { entry: new URL('./thread.ts', import.meta.url).href } })
}

/**
 * Threads that compute, as many as cores; they start when they are first needed. Tasks wait in one line, and the next is the
 * oldest of the run that has the fewest threads, so that a long run does not keep a short one waiting.
 */
export class EnginePool {
  readonly size: number
  private readonly memoryMegabytes: number
  private readonly threads: Thread[] = []
  private readonly waiting: Entry[] = []
  private lastId = 0
  private closed = false

  constructor(size: number, memoryMegabytes: number) {
    this.size = size
    this.memoryMegabytes = memoryMegabytes
  }

  /** Does a task on the next free thread. Aborting ends the thread's work at once, wherever it is, and rejects. */
  run<K extends Task['kind']>(task: Task & { kind: K }, signal?: AbortSignal): Promise<{ value: Answers[K]; cpuMs: number }> {
    return new Promise((resolve, reject) => {
      if (this.closed) return reject(new Error('the threads are closed'))
      if (signal?.aborted) return reject(signal.reason)
      const abandon = (): void => this.abandon(entry)
      const settled = (): void => signal?.removeEventListener('abort', abandon)
      const entry: Entry = {
        task,
        signal,
        resolve: (answer) => (settled(), resolve(answer)),
        reject: (error) => (settled(), reject(error as Error)),
      }
      signal?.addEventListener('abort', abandon)
      this.waiting.push(entry)
      this.assign()
    })
  }

  /** Milliseconds since the tasks of a run that are being computed were given to their threads, summed. */
  busyMs(run: string): number {
    return this.threads.reduce((sum, { entry, since }) => (entry && 'run' in entry.task && entry.task.run === run ? sum + performance.now() - since : sum), 0)
  }

  /** Ends all threads; what they were doing is rejected. */
  async close(): Promise<void> {
    this.closed = true
    for (const entry of this.waiting.splice(0)) entry.reject(new Error('the threads are closed'))
    await Promise.all([...this.threads].map((thread) => this.end(thread, new Error('the threads are closed'))))
  }

  private assign(): void {
    while (this.waiting.length > 0) {
      const thread = this.threads.find(({ entry }) => entry === null) ?? (this.threads.length < this.size ? this.startThread() : undefined)
      if (!thread) return
      const entry = this.next()
      thread.entry = entry
      thread.since = performance.now()
      thread.worker.postMessage({ id: ++this.lastId, task: entry.task })
    }
  }

  private next(): Entry {
    const load = (entry: Entry): number => this.threads.filter((thread) => thread.entry && runOf(thread.entry) === runOf(entry)).length
    const chosen = this.waiting.reduce((best, entry) => (load(entry) < load(best) ? entry : best))
    this.waiting.splice(this.waiting.indexOf(chosen), 1)
    return chosen
  }

  private startThread(): Thread {
    const thread: Thread = { worker: startWorker(this.memoryMegabytes), entry: null, since: 0 }
    thread.worker.on('message', (message: AnswerMessage) => {
      const entry = thread.entry
      thread.entry = null
      if (message.ok) entry?.resolve({ value: message.value as never, cpuMs: message.cpuMs })
      else entry?.reject(new TaskFailure(message.error))
      this.assign()
    })
    // The error of a thread that died; after it the thread is gone and the next task gets a new one.
    thread.worker.on('error', (error: Error & { code?: string }) => {
      this.drop(thread, error.code === 'ERR_WORKER_OUT_OF_MEMORY' ? new OutOfMemory(error.message) : error)
    })
    thread.worker.on('exit', (code) => this.drop(thread, new Error(`a thread ended by itself with code ${code}`)))
    this.threads.push(thread)
    return thread
  }

  private drop(thread: Thread, error: unknown): void {
    const index = this.threads.indexOf(thread)
    if (index < 0) return
    this.threads.splice(index, 1)
    thread.entry?.reject(error)
    thread.entry = null
    this.assign()
  }

  private async end(thread: Thread, error: unknown): Promise<void> {
    this.drop(thread, error)
    await thread.worker.terminate()
  }

  private abandon(entry: Entry): void {
    const index = this.waiting.indexOf(entry)
    if (index >= 0) this.waiting.splice(index, 1)
    entry.reject(entry.signal?.reason)
    const thread = this.threads.find((one) => one.entry === entry)
    if (thread) void this.end(thread, entry.signal?.reason)
  }
}

const runOf = (entry: Entry): string => ('run' in entry.task ? entry.task.run : '')
