import { and, asc, eq, isNull } from 'drizzle-orm'
import { samples } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import type { MotorVerdict } from '#shared/compute/terms/judgement'
import type { Reader } from '../../database/client'

/**
 * Judgement of each drawn motor in the order of the draw, null where none counts yet; without the figures, for what happens at every upload.
 */
export function countedJudgements(db: Pick<Reader, 'select'>, lotId: number): (MotorVerdict | null)[] {
  const drawn = db.select({ id: samples.id }).from(samples).where(eq(samples.lotId, lotId)).orderBy(asc(samples.drawOrder)).all()
  const valid = db.select({ sampleId: measurements.sampleId, judgement: measurements.judgement }).from(measurements)
    .where(and(eq(measurements.lotId, lotId), isNull(measurements.voidedAt))).orderBy(asc(measurements.attempt)).all()
  const first = new Map<number, MotorVerdict>()
  for (const row of valid) if (!first.has(row.sampleId)) first.set(row.sampleId, row.judgement)
  return drawn.map(sample => first.get(sample.id) ?? null)
}

/**
 * The drawn motors of a lot, in the order of the draw, each with the measurement that counts: the first attempt that was not voided.
 */
export function countedMeasurements(db: Pick<Reader, 'select'>, lotId: number) {
  const drawn = db.select().from(samples).where(eq(samples.lotId, lotId)).orderBy(asc(samples.drawOrder)).all()
  const valid = db.select().from(measurements).where(and(eq(measurements.lotId, lotId), isNull(measurements.voidedAt))).orderBy(asc(measurements.attempt)).all()
  const first = new Map<number, typeof measurements.$inferSelect>()
  for (const measurement of valid) if (!first.has(measurement.sampleId)) first.set(measurement.sampleId, measurement)
  return drawn.map(sample => ({ sample, measurement: first.get(sample.id) ?? null }))
}
