import { asc, eq, inArray, isNull, sql } from 'drizzle-orm'
import type { SupplierOverviewRow } from '#shared/contracts/drift'
import { decisions, lots } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import { suppliers } from '../../database/schema/people'
import { nonconformances } from '../../database/schema/returns'
import type { Context } from '../context'

/** Suppliers side by side, over all lots on record. */
export function getSupplierOverview(context: Context): SupplierOverviewRow[] {
  const { db } = context
  const byLot = new Map(db.select({
    id: lots.supplierId, lots: sql<number>`count(*)`, accepted: sql<number>`coalesce(sum(${decisions.outcome} = 'accepted'), 0)`, rejected: sql<number>`coalesce(sum(${decisions.outcome} = 'rejected'), 0)`, lastLotAt: sql<string>`max(${lots.receivedAt})`,
  }).from(lots).leftJoin(decisions, eq(decisions.lotId, lots.id)).groupBy(lots.supplierId).all().map(row => [row.id, row]))
  const first = db.select({ id: sql<number>`min(${measurements.id})` }).from(measurements).where(isNull(measurements.voidedAt)).groupBy(measurements.sampleId)
  const byMotor = new Map(db.select({ id: lots.supplierId, measured: sql<number>`count(*)`, nonconforming: sql<number>`coalesce(sum(${measurements.verdict} in ('fail', 'conditional-fail')), 0)` })
    .from(measurements).innerJoin(lots, eq(lots.id, measurements.lotId)).where(inArray(measurements.id, first)).groupBy(lots.supplierId).all().map(row => [row.id, row]))
  const byReturn = new Map(db.select({
    id: nonconformances.supplierId, open: sql<number>`sum(${nonconformances.closedAt} is null)`, days: sql<number | null>`avg(julianday(${nonconformances.acknowledgedAt}) - julianday(${nonconformances.openedAt}))`,
  }).from(nonconformances).groupBy(nonconformances.supplierId).all().map(row => [row.id, row]))
  return db.select().from(suppliers).orderBy(asc(suppliers.name)).all().map(supplier => ({
    code: supplier.code, name: supplier.name,
    lots: byLot.get(supplier.id)?.lots ?? 0, accepted: byLot.get(supplier.id)?.accepted ?? 0, rejected: byLot.get(supplier.id)?.rejected ?? 0,
    motorsMeasured: byMotor.get(supplier.id)?.measured ?? 0, motorsNonconforming: byMotor.get(supplier.id)?.nonconforming ?? 0,
    openNonconformances: byReturn.get(supplier.id)?.open ?? 0, daysToAcknowledge: byReturn.get(supplier.id)?.days ?? null, lastLotAt: byLot.get(supplier.id)?.lastLotAt ?? null,
  }))
}
