import { and, asc, eq, isNull } from 'drizzle-orm'
import { samples } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import type { Reader } from '../../database/client'

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
