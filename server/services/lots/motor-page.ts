import { asc, eq } from 'drizzle-orm'
import { describeRule } from '#shared/compute/judging/rule'
import { explainFailures } from '#shared/compute/judging/explain'
import { isNonconforming } from '#shared/compute/judging/motor-verdict'
import { designOrder } from '#shared/compute/motor/design-order'
import { evaluateSeries } from '#shared/compute/torque/evaluate'
import type { AttemptView, MotorPage } from '#shared/contracts/lots'
import type { Reader } from '../../database/client'
import { lots, samples } from '../../database/schema/lots'
import { measurementFiles, measurements, rawFiles } from '../../database/schema/measurements'
import { limitSheets, parts } from '../../database/schema/parts'
import { people, suppliers } from '../../database/schema/people'
import { calibrations, rigs } from '../../database/schema/rigs'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { countedMeasurements } from './counted-measurements'
import { getLot } from './find-lot'

type Measurement = typeof measurements.$inferSelect

/** Points over one turn that the page draws from; sixteen a period at order 256. */
const TRACE_POINTS = 4096

/** Everything that the Motor page shows of a drawn motor that has been measured. */
export function getMotorPage(context: Context, lotNumber: string, serial: string): MotorPage {
  const lot = getLot(context, lotNumber)
  const { db } = context
  const counted = countedMeasurements(db, lot.id)
  const at = counted.findIndex(row => row.sample.serial === serial)
  if (at < 0) throw new DomainError('not-found', `Lot ${lot.supplierLot} has no drawn motor ${serial}.`)
  const { sample, measurement } = counted[at]!
  if (!measurement) throw new DomainError('not-found', `Motor ${serial} has no measurement yet. Upload its file on the page of its lot.`)
  const about = db.select({ supplier: suppliers.name, part: parts, sheet: limitSheets }).from(lots).innerJoin(suppliers, eq(suppliers.id, lots.supplierId))
    .innerJoin(parts, eq(parts.id, lots.partId)).innerJoin(limitSheets, eq(limitSheets.id, lots.sheetId)).where(eq(lots.id, lot.id)).get()!
  const measuredSerials = counted.flatMap(row => row.measurement && row.sample.serial ? [row.sample.serial] : [])
  const place = measuredSerials.indexOf(serial)
  return {
    lot: { number: lot.number, supplierLot: lot.supplierLot, supplier: about.supplier, partNumber: about.part.number, partName: about.part.name, sampleSize: lot.plan.n },
    serial, drawOrder: sample.drawOrder, position: sample.position, designOrder: designOrder(about.part.design), verdict: measurement.verdict,
    limitPeakToPeakNm: about.sheet.content.limits.find(limit => limit.key === 'cogging.peakToPeak')?.upper ?? null,
    decisionRule: describeRule(about.sheet.content.decisionRule), sheetVersion: about.sheet.version, engineVersion: measurement.engineVersion,
    ...figuresOf(measurement),
    orderLimits: about.sheet.content.limits.flatMap((limit) => {
      const match = /^order\.(\d+)$/.exec(limit.key)
      return match && limit.upper !== null && limit.unit === 'N·m' ? [{ order: Number(match[1]), upperNm: limit.upper }] : []
    }),
    explanation: explanationOf(counted, serial),
    ...originOf(db, measurement),
    attempts: attemptsOf(db, sample.id, measurement.id),
    previousSerial: measuredSerials[place - 1] ?? null, nextSerial: measuredSerials[place + 1] ?? null,
  }
}

/** The lot page's sentence on this motor: compared with the conforming ones of its sample. */
function explanationOf(counted: ReturnType<typeof countedMeasurements>, serial: string): string[] {
  const motors = counted.flatMap(({ sample, measurement }) => measurement ? [{ serial: sample.serial ?? '', verdict: measurement.judgement, orders: measurement.result.orders }] : [])
  return explainFailures(motors.filter(motor => motor.serial === serial || !isNonconforming(motor.verdict.verdict)))
}

function figuresOf(measurement: Measurement) {
  const { result, judgement } = measurement
  const limited = new Set(judgement.characteristics.map(row => row.key))
  const rounded = (values: Float64Array) => Array.from(values, value => Number(value.toPrecision(5)))
  return {
    turns: result.turns, rows: result.rows, highestOrder: result.highestOrder, zeroNm: result.zeroNm, directions: result.directions, orders: result.orders, warnings: result.warnings,
    coggingNm: rounded(evaluateSeries(result.cogging, TRACE_POINTS)),
    frictionNm: result.friction ? rounded(evaluateSeries(result.friction, TRACE_POINTS)) : null,
    characteristics: judgement.characteristics,
    unlimited: result.characteristics.filter(row => !limited.has(row.key)).map(row => ({ key: row.key, value: row.value, unit: row.unit, expandedUncertainty: row.expandedUncertainty, notStated: row.notStated ?? null })),
  }
}

function originOf(db: Pick<Reader, 'select'>, measurement: Measurement): Pick<MotorPage, 'rig' | 'measuredAt' | 'measuredBy' | 'files'> {
  const rig = db.select({ code: rigs.code, calibration: calibrations.certificateNumber, dueOn: calibrations.dueOn }).from(calibrations).innerJoin(rigs, eq(rigs.id, calibrations.rigId)).where(eq(calibrations.id, measurement.calibrationId)).get()!
  const files = db.select({ name: measurementFiles.name, sha256: rawFiles.sha256, size: rawFiles.size }).from(measurementFiles).innerJoin(rawFiles, eq(rawFiles.sha256, measurementFiles.sha256))
    .where(eq(measurementFiles.measurementId, measurement.id)).orderBy(asc(measurementFiles.ordinal)).all()
  const measuredBy = db.select({ name: people.name }).from(people).where(eq(people.id, measurement.measuredById)).get()!.name
  return { rig, files, measuredBy, measuredAt: measurement.measuredAt }
}

function attemptsOf(db: Pick<Reader, 'select'>, sampleId: number, countedId: number): AttemptView[] {
  return db.select({ row: measurements, rig: rigs.code, measuredBy: people.name }).from(measurements).innerJoin(rigs, eq(rigs.id, measurements.rigId)).innerJoin(people, eq(people.id, measurements.measuredById))
    .innerJoin(samples, eq(samples.id, measurements.sampleId)).where(eq(measurements.sampleId, sampleId)).orderBy(asc(measurements.attempt)).all()
    .map(({ row, rig, measuredBy }) => ({ id: row.id, attempt: row.attempt, verdict: row.verdict, counts: row.id === countedId, measuredAt: row.measuredAt, measuredBy, reason: row.reason, voidReason: row.voidReason, rig }))
}
