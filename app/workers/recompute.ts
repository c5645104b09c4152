import { judgeMotor } from '#shared/compute/judging/motor-verdict'
import { analyse } from '#shared/compute/torque/analyse'
import type { AnalysisSettings, Characteristic } from '#shared/compute/terms/measurement'
import type { LimitSheetContent, Verdict } from '#shared/compute/terms/judgement'

/** One motor to be recomputed from its raw files, in the visitor's own browser. */
export interface RecomputeJob {
  index: number
  files: { name: string; bytes: Uint8Array }[]
  settings: AnalysisSettings
  content: LimitSheetContent
}

export interface RecomputeReply {
  index: number
  characteristics: Characteristic[]
  verdict: Verdict | null
  fault: string | null
}

self.onmessage = (event: MessageEvent<RecomputeJob>) => {
  const { index, files, settings, content } = event.data
  let reply: RecomputeReply
  try {
    const outcome = analyse(files, settings)
    reply = outcome.ok
      ? { index, characteristics: outcome.result.characteristics, verdict: judgeMotor({ content, characteristics: outcome.result.characteristics }).verdict, fault: null }
      : { index, characteristics: [], verdict: null, fault: outcome.fault.sentence }
  }
  catch (error) {
    reply = { index, characteristics: [], verdict: null, fault: error instanceof Error ? error.message : String(error) }
  }
  self.postMessage(reply)
}
