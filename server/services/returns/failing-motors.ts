import { asc, eq, inArray } from 'drizzle-orm'
import { describeCharacteristic, isCharacteristicKey } from '#shared/compute/judging/characteristics'
import { explainFailures } from '#shared/compute/judging/explain'
import { isNonconforming } from '#shared/compute/judging/motor-verdict'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import type { FailingMotor } from '#shared/contracts/returns'
import type { Reader } from '../../database/client'
import { measurementFiles, rawFiles } from '../../database/schema/measurements'
import type { countedMeasurements } from '../lots/counted-measurements'

/** Points of a small ring; enough for four a period of order 264 at the size it is drawn. */
const RING_POINTS = 1024

type Counted = ReturnType<typeof countedMeasurements>

/** A motor's name for people: its serial, or its position while none is bound. */
export function motorName(sample: { serial: string | null; position: number }): string {
  return sample.serial ?? `Position ${sample.position}`
}

/** Name of a characteristic for people; the key itself when this version does not know it. */
export function labelOf(key: string): string {
  return isCharacteristicKey(key) ? describeCharacteristic(key).label : key
}

/** Sentences on the likely origin of what fails, one a nonconforming motor. */
export function likelyOrigins(counted: Counted): string[] {
  return explainFailures(counted.flatMap(({ sample, measurement }) => measurement ? [{ serial: motorName(sample), verdict: measurement.judgement, orders: measurement.result.orders }] : []))
}

/** The nonconforming motors of a lot's sample with what fails and the files behind it, in the order of the draw. */
export function failingMotors(db: Pick<Reader, 'select'>, counted: Counted): FailingMotor[] {
  const failing = counted.flatMap(({ sample, measurement }) => measurement && isNonconforming(measurement.verdict) ? [{ sample, measurement }] : [])
  const files = filesOf(db, failing.map(each => each.measurement.id))
  return failing.map(({ sample, measurement }) => ({
    serial: sample.serial, drawOrder: sample.drawOrder, position: sample.position, verdict: measurement.verdict,
    ring: Array.from(evaluateSeries(measurement.result.cogging, RING_POINTS), value => Number(value.toPrecision(4))),
    failures: measurement.judgement.characteristics.filter(row => isNonconforming(row.verdict)).map(row => ({ ...row, label: labelOf(row.key) })),
    files: files.get(measurement.id) ?? [],
  }))
}

/** The raw files of measurements, in order. */
export function filesOf(db: Pick<Reader, 'select'>, measurementIds: number[]): Map<number, FailingMotor['files']> {
  const byMeasurement = new Map<number, FailingMotor['files']>()
  if (measurementIds.length === 0) return byMeasurement
  const rows = db.select({ measurementId: measurementFiles.measurementId, name: measurementFiles.name, sha256: rawFiles.sha256, size: rawFiles.size }).from(measurementFiles)
    .innerJoin(rawFiles, eq(rawFiles.sha256, measurementFiles.sha256)).where(inArray(measurementFiles.measurementId, measurementIds)).orderBy(asc(measurementFiles.measurementId), asc(measurementFiles.ordinal)).all()
  for (const { measurementId, ...file } of rows) byMeasurement.set(measurementId, [...byMeasurement.get(measurementId) ?? [], file])
  return byMeasurement
}
