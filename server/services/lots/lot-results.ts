import { eq } from 'drizzle-orm'
import { describeCharacteristic, isCharacteristicKey } from '#shared/compute/judging/characteristics'
import { limitSheets, parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import type { Context } from '../context'
import { filesOf } from '../returns/failing-motors'
import { countedMeasurements } from './counted-measurements'
import { getLot } from './find-lot'

/** A lot's results as data: SI units, one motor a sample, one row a characteristic that the sheet limits or the engine computed. */
export interface LotResults {
  lot: string
  supplierLot: string
  supplier: string
  part: string
  sheetVersion: number
  plan: string
  motors: MotorResults[]
}

interface MotorResults {
  drawOrder: number
  position: number
  serial: string | null
  verdict: string | null
  measuredAt: string | null
  attempt: number | null
  engineVersion: string | null
  files: { name: string; sha256: string }[]
  characteristics: CharacteristicResult[]
}

interface CharacteristicResult {
  key: string
  label: string
  value: number | null
  unit: string
  expandedUncertainty: number | null
  lower: number | null
  upper: number | null
  verdict: string | null
  reason: string
}

/**
 * All figures of a lot, as judged and stored.
 *
 * @throws DomainError `not-found`, also for another supplier's lot.
 */
export function getLotResults(context: Context, number: string): LotResults {
  const lot = getLot(context, number)
  const { db } = context
  const counted = countedMeasurements(db, lot.id)
  const files = filesOf(db, counted.flatMap(row => row.measurement ? [row.measurement.id] : []))
  return {
    lot: lot.number, supplierLot: lot.supplierLot,
    supplier: db.select({ name: suppliers.name }).from(suppliers).where(eq(suppliers.id, lot.supplierId)).get()!.name,
    part: db.select({ number: parts.number }).from(parts).where(eq(parts.id, lot.partId)).get()!.number,
    sheetVersion: db.select({ version: limitSheets.version }).from(limitSheets).where(eq(limitSheets.id, lot.sheetId)).get()!.version,
    plan: lot.plan.sentence,
    motors: counted.map(({ sample, measurement }) => ({
      drawOrder: sample.drawOrder, position: sample.position, serial: sample.serial, verdict: measurement?.verdict ?? null, measuredAt: measurement?.measuredAt ?? null,
      attempt: measurement?.attempt ?? null, engineVersion: measurement?.engineVersion ?? null,
      files: measurement ? (files.get(measurement.id) ?? []).map(file => ({ name: file.name, sha256: file.sha256 })) : [],
      characteristics: measurement ? characteristicsOf(measurement) : [],
    })),
  }
}

function characteristicsOf({ result, judgement }: NonNullable<ReturnType<typeof countedMeasurements>[number]['measurement']>): CharacteristicResult[] {
  const label = (key: string) => isCharacteristicKey(key) ? describeCharacteristic(key).label : key
  const limited = judgement.characteristics.map(({ key, value, unit, expandedUncertainty, lower, upper, verdict, reason }) => ({ key, label: label(key), value, unit, expandedUncertainty, lower, upper, verdict, reason }))
  const keys = new Set(limited.map(row => row.key))
  const others = result.characteristics.filter(row => !keys.has(row.key)).map(({ key, value, unit, expandedUncertainty, notStated }) => ({ key, label: label(key), value, unit, expandedUncertainty, lower: null, upper: null, verdict: null, reason: notStated ?? '' }))
  return [...limited, ...others]
}

const COLUMNS = ['lot', 'supplier lot', 'part', 'draw order', 'position', 'serial', 'measured at (UTC)', 'motor verdict', 'characteristic', 'name', 'value', 'unit', 'expanded uncertainty (k = 2)', 'lower limit', 'upper limit', 'verdict', 'reason']

/**
 * The results as a table for spreadsheets: RFC 4180 with a byte order mark, one row a motor and characteristic. A text that a spreadsheet would run as a
 * formula is led by an apostrophe.
 */
export function resultsAsCsv(results: LotResults): string {
  const rows = results.motors.flatMap(motor => (motor.characteristics.length > 0 ? motor.characteristics : [null]).map(row => [
    results.lot, results.supplierLot, results.part, motor.drawOrder, motor.position, motor.serial, motor.measuredAt, motor.verdict ?? 'not judged',
    row?.key, row?.label, row?.value, row?.unit, row?.expandedUncertainty, row?.lower, row?.upper, row?.verdict, row?.reason,
  ]))
  return `\uFEFF${[COLUMNS, ...rows].map(row => row.map(csvCell).join(',')).join('\r\n')}\r\n`
}

/** One cell: numbers as they are, texts quoted where needed and never the start of a formula. */
export function csvCell(value: string | number | null | undefined): string {
  if (value === null || value === undefined) return ''
  if (typeof value === 'number') return String(value)
  const safe = /^\s*[=+\-@\t\r]/.test(value) ? `'${value}` : value
  return /[",\r\n']/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}
