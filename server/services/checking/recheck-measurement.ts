import { asc, eq } from 'drizzle-orm'
import { judgeMotor } from '#shared/compute/judging/motor-verdict'
import { analyse } from '#shared/compute/torque/analyse'
import type { Reader } from '../../database/client'
import { lots, samples } from '../../database/schema/lots'
import { measurementFiles, measurements } from '../../database/schema/measurements'
import { limitSheets, parts } from '../../database/schema/parts'
import { calibrations, rigs } from '../../database/schema/rigs'
import type { FileStore } from '../../files/store'
import { analysisSettings } from '../measuring/analysis-settings'

/** Figures recomputed on the same machine differ by rounding at most. */
const TOLERANCE = 1e-9

/**
 * Analyses a stored measurement again from its raw files and compares every figure and verdict with what is stored.
 *
 * @returns one sentence for each difference; empty when all follows.
 */
export async function recheckMeasurement(services: { db: Pick<Reader, 'select'>; files: Pick<FileStore, 'get'> }, measurementId: number): Promise<string[]> {
  const { db } = services
  const found = db.select({ measurement: measurements, lot: lots, part: parts, sheet: limitSheets, rig: rigs, calibration: calibrations, serial: samples.serial }).from(measurements)
    .innerJoin(samples, eq(samples.id, measurements.sampleId)).innerJoin(lots, eq(lots.id, measurements.lotId)).innerJoin(parts, eq(parts.id, lots.partId)).innerJoin(limitSheets, eq(limitSheets.id, measurements.sheetId))
    .innerJoin(rigs, eq(rigs.id, measurements.rigId)).innerJoin(calibrations, eq(calibrations.id, measurements.calibrationId)).where(eq(measurements.id, measurementId)).get()!
  const name = `Lot ${found.lot.supplierLot}, motor ${found.serial}`
  const stored = found.measurement
  const listed = db.select().from(measurementFiles).where(eq(measurementFiles.measurementId, measurementId)).orderBy(asc(measurementFiles.ordinal)).all()
  const files: { name: string; bytes: Uint8Array }[] = []
  for (const file of listed) {
    try {
      files.push({ name: file.name, bytes: await services.files.get(file.sha256) })
    }
    catch (error) {
      return [`${name}: ${error instanceof Error ? error.message : String(error)}`]
    }
  }
  const recipe = stored.result.recipe.version > 0 ? stored.result.recipe : null
  const outcome = analyse(files, analysisSettings({ part: found.part, content: found.sheet.content, rig: found.rig, calibration: found.calibration, recipe }))
  if (!outcome.ok) return [`${name}: ${outcome.fault.sentence}`]
  const judgement = judgeMotor({ content: found.sheet.content, characteristics: outcome.result.characteristics })
  return [
    ...differentFigures(stored.result.characteristics, outcome.result.characteristics).map(sentence => `${name}: ${sentence}`),
    ...(judgement.verdict === stored.verdict ? [] : [`${name}: the verdict is ${judgement.verdict ?? 'open'}, stored is ${stored.verdict ?? 'open'}.`]),
  ]
}

type Figures = readonly { key: string; value: number | null }[]

function differentFigures(stored: Figures, again: Figures): string[] {
  const values = new Map(again.map(row => [row.key, row.value]))
  return stored.flatMap(({ key, value }) => {
    const now = values.get(key) ?? null
    const same = now === value || (now !== null && value !== null && Math.abs(now - value) <= TOLERANCE * Math.max(Math.abs(now), Math.abs(value)))
    return same ? [] : [`${key} is ${now ?? 'not stated'}, stored is ${value ?? 'not stated'}.`]
  })
}
