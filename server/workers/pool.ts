import { availableParallelism } from 'node:os'
import { Worker } from 'node:worker_threads'
import type { AnalysisOutcome, AnalysisSettings } from '#shared/compute/terms/measurement'

export interface AnalysisJob {
  id: number
  files: { name: string; bytes: Uint8Array }[]
  settings: AnalysisSettings
}

export interface AnalysisReply {
  id: number
  outcome?: AnalysisOutcome
  error?: string
}

interface Waiting {
  job: AnalysisJob
  resolve: (outcome: AnalysisOutcome) => void
  reject: (error: Error) => void
}

/** A few threads that analyse files, so that the event loop stays free. */
export interface AnalysisPool {
  analyse: (files: AnalysisJob['files'], settings: AnalysisSettings) => Promise<AnalysisOutcome>
  close: () => Promise<void>
}

/**
 * Starts the pool. A thread that dies fails its own job and is replaced.
 *
 * @param code source of the worker, bundled (see thread-code.ts).
 * @param size number of threads; by default the machine's cores, four at most.
 */
export function startAnalysisPool(code: string, size: number = Math.min(4, availableParallelism())): AnalysisPool {
  const queue: Waiting[] = []
  const idle: Worker[] = []
  const busy = new Map<Worker, Waiting>()
  let nextId = 1
  let closing = false

  function start(): void {
    const worker = new Worker(code, { eval: true })
    worker.unref()
    worker.on('message', (reply: AnalysisReply) => {
      const waiting = busy.get(worker)
      busy.delete(worker)
      idle.push(worker)
      if (reply.outcome) waiting?.resolve(reply.outcome)
      else waiting?.reject(new Error(reply.error ?? 'the analysis gave no answer'))
      next()
    })
    worker.on('error', (error: Error) => {
      busy.get(worker)?.reject(error)
      busy.delete(worker)
      const at = idle.indexOf(worker)
      if (at >= 0) idle.splice(at, 1)
      if (!closing) start()
    })
    idle.push(worker)
    next()
  }

  function next(): void {
    while (idle.length > 0 && queue.length > 0) {
      const worker = idle.pop()!
      const waiting = queue.shift()!
      busy.set(worker, waiting)
      worker.postMessage(waiting.job)
    }
  }

  for (let i = 0; i < size; i++) start()

  return {
    analyse: (files, settings) => new Promise((resolve, reject) => {
      queue.push({ job: { id: nextId++, files, settings }, resolve, reject })
      next()
    }),
    async close() {
      closing = true
      await Promise.all([...idle, ...busy.keys()].map(worker => worker.terminate()))
    },
  }
}
