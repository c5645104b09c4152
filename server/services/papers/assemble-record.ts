import { asc, eq, inArray } from 'drizzle-orm'
import { explainFailures } from '#shared/compute/judging/explain'
import { designOrder } from '#shared/compute/motor/design-order'
import type { FourierSeries } from '#shared/compute/terms/measurement'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'
import type { Reader } from '../../database/client'
import { decisions, lots } from '../../database/schema/lots'
import { measurementFiles, measurements, rawFiles } from '../../database/schema/measurements'
import { limitSheets, parts } from '../../database/schema/parts'
import { people, suppliers } from '../../database/schema/people'
import { calibrations, rigs } from '../../database/schema/rigs'
import { countedMeasurements } from '../lots/counted-measurements'

type Db = Pick<Reader, 'select'>
/** What the issuing adds. */
export type AssembledRecord = Omit<PaperRecord, 'schema' | 'number' | 'kind' | 'issuedAt' | 'timeZone' | 'buyer' | 'logbook' | 'checkAddress'>

const MEANING = 'I have looked at the figures stated here and decide this lot by the plan and the limit sheet named.'

/** Everything about a decided lot that its certificate states, read from the database. */
export function assembleRecord(db: Db, lotId: number): AssembledRecord {
  const { lot, supplier, part, sheet, decision } = db.select({ lot: lots, supplier: suppliers, part: parts, sheet: limitSheets, decision: decisions }).from(lots)
    .innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId)).innerJoin(limitSheets, eq(limitSheets.id, lots.sheetId))
    .innerJoin(decisions, eq(decisions.lotId, lots.id)).where(eq(lots.id, lotId)).get()!
  const nameOf = namesOf(db)
  const counted = countedMeasurements(db, lotId)
  return {
    supplier: { code: supplier.code, name: supplier.name, address: supplier.address },
    part: { number: part.number, name: part.name, revision: part.revision, design: part.design, designOrder: designOrder(part.design), ratedTorqueNm: part.ratedTorqueNm },
    lot: {
      receipt: lot.number, supplierLot: lot.supplierLot, quantity: lot.quantity, orderNumber: lot.orderNumber, receivedAt: lot.receivedAt, receivedBy: nameOf(lot.receivedById),
      resubmissionOf: lot.resubmissionOfId === null ? null : db.select({ number: lots.number }).from(lots).where(eq(lots.id, lot.resubmissionOfId)).get()?.number ?? null,
    },
    plan: lot.plan, severityReason: lot.severityReason, draw: { seed: lot.drawSeed, generator: lot.drawGenerator },
    sheet: { version: sheet.version, content: sheet.content, author: nameOf(sheet.authorId), approvedBy: nameOf(sheet.approvedById), approvedAt: sheet.approvedAt ?? '', effectiveFrom: sheet.effectiveFrom ?? '' },
    rigs: rigsOf(db, counted),
    samples: samplesOf(db, lotId, counted, nameOf),
    lotVerdict: decision.lotVerdict,
    explanation: explainFailures(counted.flatMap(({ sample, measurement }) => measurement ? [{ serial: sample.serial ?? `position ${sample.position}`, verdict: measurement.judgement, orders: measurement.result.orders }] : [])),
    decision: { outcome: decision.outcome, overruled: decision.overruled, reason: decision.reason, evidenceHash: decision.evidenceHash, signedBy: nameOf(decision.signedById), signedAt: decision.signedAt, meaning: MEANING },
  }
}

function namesOf(db: Db): (id: number | null) => string {
  const names = new Map(db.select({ id: people.id, name: people.name }).from(people).all().map(person => [person.id, person.name]))
  return id => id === null ? 'not stated' : names.get(id) ?? 'not stated'
}

type Counted = ReturnType<typeof countedMeasurements>

function rigsOf(db: Db, counted: Counted): PaperRecord['rigs'] {
  const ids = [...new Set(counted.flatMap(row => row.measurement ? [row.measurement.calibrationId] : []))]
  if (ids.length === 0) return []
  return db.select({ rig: rigs, calibration: calibrations }).from(calibrations).innerJoin(rigs, eq(rigs.id, calibrations.rigId)).where(inArray(calibrations.id, ids)).orderBy(asc(rigs.code), asc(calibrations.id)).all().map(({ rig, calibration }) => ({
    code: rig.code, name: rig.name, method: rig.method, properties: rig.properties,
    calibration: {
      certificateNumber: calibration.certificateNumber, laboratory: calibration.laboratory, performedOn: calibration.performedOn, dueOn: calibration.dueOn,
      torqueRelativeUncertainty: calibration.torqueRelativeUncertainty, torqueAbsoluteUncertaintyNm: calibration.torqueAbsoluteUncertaintyNm,
    },
  }))
}

function samplesOf(db: Db, lotId: number, counted: Counted, nameOf: (id: number | null) => string): PaperSample[] {
  const attempts = new Map<number, number>()
  for (const row of db.select({ sampleId: measurements.sampleId }).from(measurements).where(eq(measurements.lotId, lotId)).all()) attempts.set(row.sampleId, (attempts.get(row.sampleId) ?? 0) + 1)
  const files = db.select({ measurementId: measurementFiles.measurementId, name: measurementFiles.name, sha256: rawFiles.sha256, size: rawFiles.size }).from(measurementFiles)
    .innerJoin(rawFiles, eq(rawFiles.sha256, measurementFiles.sha256)).innerJoin(measurements, eq(measurements.id, measurementFiles.measurementId)).where(eq(measurements.lotId, lotId)).orderBy(asc(measurementFiles.ordinal)).all()
  const rigCodes = new Map(db.select({ id: rigs.id, code: rigs.code }).from(rigs).all().map(rig => [rig.id, rig.code]))
  const certificates = new Map(db.select({ id: calibrations.id, number: calibrations.certificateNumber }).from(calibrations).all().map(row => [row.id, row.number]))
  return counted.map(({ sample, measurement }) => ({
    drawOrder: sample.drawOrder, position: sample.position, serial: sample.serial, verdict: measurement?.verdict ?? null, attempts: attempts.get(sample.id) ?? 0, attempt: measurement?.attempt ?? null,
    measuredAt: measurement?.measuredAt ?? null, measuredBy: measurement ? nameOf(measurement.measuredById) : null, rig: measurement ? rigCodes.get(measurement.rigId) ?? null : null, calibration: measurement ? certificates.get(measurement.calibrationId) ?? null : null, engineVersion: measurement?.engineVersion ?? null,
    recipe: measurement && measurement.result.recipe.version > 0 ? measurement.result.recipe : null,
    files: files.filter(file => file.measurementId === measurement?.id).map(({ name, sha256, size }) => ({ name, sha256, size })),
    characteristics: measurement?.judgement.characteristics ?? [], warnings: measurement?.result.warnings ?? [], orders: measurement?.result.orders ?? [],
    cogging: measurement ? rounded(measurement.result.cogging) : null,
  }))
}

/** Coefficients as far as a drawing needs them. */
function rounded(series: FourierSeries): FourierSeries {
  const round = (value: number) => Number(value.toPrecision(6))
  return { meanNm: 0, cosNm: series.cosNm.map(round), sinNm: series.sinNm.map(round) }
}
