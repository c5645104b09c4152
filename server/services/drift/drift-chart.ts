import { and, asc, desc, eq, inArray, isNull, sql } from 'drizzle-orm'
import type { z } from 'zod'
import { describeCharacteristic } from '#shared/compute/judging/characteristics'
import { formatQuantity, joinQuantity } from '#shared/compute/judging/quantities'
import { individualsLimits } from '#shared/compute/statistics/individuals-chart'
import type { IndividualsLimits } from '#shared/compute/statistics/individuals-chart'
import type { CharacteristicUnit } from '#shared/compute/terms/measurement'
import type { DriftAnswer, DriftChart, DriftChoice, DriftPoint, driftQuerySchema } from '#shared/contracts/drift'
import { driftBases } from '../../database/schema/drift'
import { decisions, lots } from '../../database/schema/lots'
import { measurements, measurementValues } from '../../database/schema/measurements'
import { limitSheets, parts } from '../../database/schema/parts'
import { people, suppliers } from '../../database/schema/people'
import type { Context } from '../context'

/** Lots that make the base period while no engineer has frozen one; common practice, no source. */
const LOTS_OF_DEFAULT_BASE = 8

interface Subject { supplierId: number; partId: number }

/** The individuals chart of one supplier × part × characteristic, with everything that can be chosen instead. */
export function getDrift(context: Context, query: z.output<typeof driftQuerySchema>): DriftAnswer {
  const choices = listChoices(context)
  const asked = query.supplier !== '' || query.part !== ''
  // Without a wish, the first of which something was measured.
  const choice = asked ? choices.find(row => row.supplier === query.supplier && row.part === query.part) : choices.find(row => listKeys(context, row).length > 0) ?? choices[0]
  if (!choice) return { choices: choices.map(publicChoice), keys: [], chart: null }
  const keys = listKeys(context, choice)
  const key = keys.includes(query.key) ? query.key : keys[0]
  return {
    choices: choices.map(publicChoice),
    keys: keys.map(each => ({ key: each, label: describeCharacteristic(each).label })),
    chart: key === undefined ? null : chartOf(context, choice, key),
  }
}

const publicChoice = ({ supplier, supplierName, part, partName, lots: count }: DriftChoice & Subject): DriftChoice => ({ supplier, supplierName, part, partName, lots: count })

/** A supplier's contact sees its own company's only. */
function listChoices(context: Context): (DriftChoice & Subject)[] {
  const own = context.actor.role === 'supplier' ? eq(lots.supplierId, context.actor.supplierId ?? -1) : undefined
  return context.db.select({ supplierId: suppliers.id, partId: parts.id, supplier: suppliers.code, supplierName: suppliers.name, part: parts.number, partName: parts.name, lots: sql<number>`count(*)` })
    .from(lots).innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId)).where(own)
    .groupBy(suppliers.id, parts.id).orderBy(asc(suppliers.name), asc(parts.number)).all()
}

function listKeys(context: Context, subject: Subject): string[] {
  const found = context.db.selectDistinct({ key: measurementValues.key }).from(measurementValues).innerJoin(measurements, eq(measurements.id, measurementValues.measurementId))
    .innerJoin(lots, eq(lots.id, measurements.lotId)).where(and(eq(lots.supplierId, subject.supplierId), eq(lots.partId, subject.partId))).all().map(row => row.key)
  const orderOf = (key: string) => Number(/^order\.(\d+)$/.exec(key)?.[1] ?? 0)
  return found.sort((a, b) => orderOf(a) - orderOf(b) || a.localeCompare(b))
}

function chartOf(context: Context, subject: DriftChoice & Subject, key: string): DriftChart {
  const { db } = context
  const base = db.select({ row: driftBases, frozenBy: people.name }).from(driftBases).innerJoin(people, eq(people.id, driftBases.frozenById))
    .where(and(eq(driftBases.supplierId, subject.supplierId), eq(driftBases.partId, subject.partId), eq(driftBases.key, key))).orderBy(desc(driftBases.version)).limit(1).get()
  const means = lotMeans(context, subject, key)
  const inBase = means.map((point, index) => base ? point.receivedAt.slice(0, 10) >= base.row.fromDate && point.receivedAt.slice(0, 10) <= base.row.toDate : index < LOTS_OF_DEFAULT_BASE)
  const baseMeans = means.filter((_, index) => inBase[index]).map(point => point.mean)
  const limits = baseMeans.length >= 2 ? individualsLimits(baseMeans) : null
  const points = means.map((point, index): DriftPoint => ({
    ...point, inBase: inBase[index]!, movingRange: index === 0 ? null : Math.abs(point.mean - means[index - 1]!.mean),
    signal: limits !== null && (point.mean > limits.upper || point.mean < limits.lower),
  }))
  const unit: CharacteristicUnit = describeCharacteristic(key).unit
  return {
    supplier: subject.supplier, supplierName: subject.supplierName, part: subject.part, partName: subject.partName, key, label: describeCharacteristic(key).label, unit, points, limits,
    base: base ? { version: base.row.version, fromDate: base.row.fromDate, toDate: base.row.toDate, frozenBy: base.frozenBy, frozenAt: base.row.frozenAt, reason: base.row.reason } : null,
    baseSentence: base ? `Base period frozen from ${base.row.fromDate} to ${base.row.toDate}.` : `No base period is frozen: the first ${Math.min(LOTS_OF_DEFAULT_BASE, means.length)} lots are used until an engineer freezes one.`,
    sheetLimit: sheetLimit(context, subject, key),
    summary: summaryOf(points, limits, unit),
  }
}

/** Mean of each lot over its first valid attempt per motor, in order of receipt. */
function lotMeans(context: Context, subject: Subject, key: string) {
  const { db } = context
  const first = db.select({ id: sql<number>`min(${measurements.id})`.as('id') }).from(measurements).innerJoin(lots, eq(lots.id, measurements.lotId))
    .where(and(isNull(measurements.voidedAt), eq(lots.supplierId, subject.supplierId), eq(lots.partId, subject.partId))).groupBy(measurements.sampleId)
  return db.select({
    lotNumber: lots.number, supplierLot: lots.supplierLot, receivedAt: lots.receivedAt, mean: sql<number>`avg(${measurementValues.value})`, motors: sql<number>`count(*)`, outcome: decisions.outcome,
  }).from(measurementValues).innerJoin(measurements, eq(measurements.id, measurementValues.measurementId)).innerJoin(lots, eq(lots.id, measurements.lotId)).leftJoin(decisions, eq(decisions.lotId, lots.id))
    .where(and(eq(measurementValues.key, key), inArray(measurements.id, first))).groupBy(lots.id).orderBy(asc(lots.receivedAt), asc(lots.id)).all()
}

function sheetLimit(context: Context, subject: Subject, key: string): DriftChart['sheetLimit'] {
  const sheet = context.db.select().from(limitSheets).where(and(eq(limitSheets.partId, subject.partId), eq(limitSheets.state, 'approved'))).orderBy(desc(limitSheets.version)).limit(1).get()
  const limit = sheet?.content.limits.find(row => row.key === key)
  return limit ? { lower: limit.lower, upper: limit.upper } : null
}

function summaryOf(points: DriftPoint[], limits: IndividualsLimits | null, unit: CharacteristicUnit): string {
  if (points.length === 0) return 'No lot has been measured yet.'
  if (!limits) return 'Two lots in the base period are needed before limits can be drawn.'
  const show = (value: number) => joinQuantity(formatQuantity(value, unit).text, formatQuantity(value, unit).unit)
  const signals = points.filter(point => point.signal)
  const range = `The process ran around ${show(limits.centre)} in the base period, limits ${show(limits.lower)} to ${show(limits.upper)}.`
  if (signals.length === 0) return `${range} No lot lies outside them.`
  const last = signals.at(-1)!
  return `${range} ${signals.length} of ${points.length} lots lie outside, the latest ${last.supplierLot} at ${show(last.mean)}.`
}
