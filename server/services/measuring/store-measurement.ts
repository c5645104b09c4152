import { and, eq, isNull, max } from 'drizzle-orm'
import { lotLifecycle } from '#shared/compute/lifecycle/lot'
import { judgeLot } from '#shared/compute/sampling/lot-verdict'
import type { MotorVerdict } from '#shared/compute/terms/judgement'
import type { MapResult } from '#shared/compute/terms/measurement'
import type { UploadAnswer } from '#shared/contracts/lots'
import type { Transaction } from '../../database/client'
import type { samples } from '../../database/schema/lots';
import { lots } from '../../database/schema/lots'
import { measurementFiles, measurements, measurementValues, uploads } from '../../database/schema/measurements'
import type { calibrations, rigs } from '../../database/schema/rigs'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { countedJudgements } from '../lots/counted-measurements'
import { appendToLogbook } from '../logbook/append'
import { answerOf } from './upload-answer'

export interface MeasurementInput {
  lot: typeof lots.$inferSelect
  sample: typeof samples.$inferSelect
  sheetId: number
  usable: { rig: typeof rigs.$inferSelect; calibration: typeof calibrations.$inferSelect }
  input: { name: string; reason: string }
  files: { name: string; sha256: string }[]
  result: MapResult
  judgement: MotorVerdict
  /** The earlier one-direction upload that this measurement completes. */
  joins: typeof uploads.$inferSelect | null
}

/**
 * Writes a judged attempt: measurement, its figures and files, the upload, the lot's new state and the logbook entry, in one transaction that first
 * rechecks that the lot still takes measurements.
 */
export function storeMeasurement(context: Context, input: MeasurementInput): UploadAnswer {
  const upload = context.db.transaction((tx) => {
    const lot = tx.select().from(lots).where(eq(lots.id, input.lot.id)).get()!
    if (lot.decidedAt) throw new DomainError('conflict', `Lot ${lot.supplierLot} was decided in the meantime; the measurement of ${input.sample.serial} was not entered. Its file is kept.`)
    refuseUnexplainedRepeat(tx, input)
    const measurement = insertMeasurement(context, tx, input)
    const written = tx.insert(uploads).values({
      lotId: lot.id, sampleId: input.sample.id, name: input.input.name, sha256: input.files.at(-1)!.sha256, rigId: input.usable.rig.id, state: 'judged',
      measurementId: measurement.id, uploadedById: context.actor.personId, uploadedAt: now(context),
    }).returning().get()
    if (input.joins) tx.update(uploads).set({ state: 'judged', measurementId: measurement.id }).where(eq(uploads.id, input.joins.id)).run()
    advanceLot(tx, lot)
    appendToLogbook(context, tx, {
      actorId: context.actor.personId, action: 'motor.measured', subjectKind: 'measurement', subjectId: measurement.id,
      content: { lot: lot.number, position: input.sample.position, attempt: measurement.attempt, verdict: measurement.verdict, files: input.files.map(file => file.sha256), rigId: input.usable.rig.id, calibrationId: input.usable.calibration.id, engineVersion: measurement.engineVersion },
    })
    return written
  }, { behavior: 'immediate' })
  return answerOf(context.db, upload)
}

/** Two files of one motor may have been analysed at the same time: the second needs a reason like any other repeat. */
function refuseUnexplainedRepeat(tx: Transaction, input: MeasurementInput): void {
  if (input.input.reason !== '') return
  const valid = tx.select({ id: measurements.id }).from(measurements).where(and(eq(measurements.sampleId, input.sample.id), isNull(measurements.voidedAt))).get()
  if (valid) throw new DomainError('conflict', `Motor ${input.sample.serial} has a measurement already. Say why it is measured again; every attempt is kept.`, { fields: [{ field: 'reason', message: 'A reason is needed.' }] })
}

function insertMeasurement(context: Context, tx: Transaction, input: MeasurementInput) {
  const last = tx.select({ attempt: max(measurements.attempt) }).from(measurements).where(eq(measurements.sampleId, input.sample.id)).get()?.attempt ?? 0
  const measurement = tx.insert(measurements).values({
    lotId: input.lot.id, sampleId: input.sample.id, attempt: last + 1, method: input.result.method, rigId: input.usable.rig.id, calibrationId: input.usable.calibration.id,
    sheetId: input.sheetId, engineVersion: input.result.engineVersion, result: input.result, verdict: input.judgement.verdict, judgement: input.judgement,
    reason: input.input.reason, measuredById: context.actor.personId, measuredAt: now(context),
  }).returning().get()
  tx.insert(measurementFiles).values(input.files.map((file, index) => ({ measurementId: measurement.id, ordinal: index + 1, sha256: file.sha256, name: file.name }))).run()
  const values = input.result.characteristics.flatMap(row => row.value === null ? [] : [{ measurementId: measurement.id, key: row.key, value: row.value, expandedUncertainty: row.expandedUncertainty, unit: row.unit }])
  if (values.length > 0) tx.insert(measurementValues).values(values).run()
  return measurement
}

/**
 * Brings the lot's state in line with its counted measurements: measuring from the first judged motor on, ready as soon as the plan can decide (every sample
 * judged, or the rejection number reached), and back when an attempt was voided.
 */
export function advanceLot(tx: Transaction, lot: typeof lots.$inferSelect): void {
  const verdict = judgeLot({ plan: lot.plan, motors: countedJudgements(tx, lot.id) })
  const decidable = verdict.outcome !== 'open'
  let state = lot.state
  if (state === 'drawn') state = lotLifecycle.transition(state, 'measure')
  if (state === 'measuring' && decidable) state = lotLifecycle.transition(state, 'finish-measuring')
  if (state === 'ready' && !decidable) state = lotLifecycle.transition(state, 'reopen-measuring')
  tx.update(lots).set({ state }).where(eq(lots.id, lot.id)).run()
}
