import { parentPort } from 'node:worker_threads'
import { analyse } from '#shared/compute/torque/analyse'
import type { AnalysisJob, AnalysisReply } from './pool'

/** Runs in a worker thread: one analysis a message. */
parentPort!.on('message', (job: AnalysisJob) => {
  let reply: AnalysisReply
  try {
    reply = { id: job.id, outcome: analyse(job.files, job.settings) }
  }
  catch (error) {
    reply = { id: job.id, error: error instanceof Error ? error.message : String(error) }
  }
  parentPort!.postMessage(reply)
})
