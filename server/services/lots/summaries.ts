import { and, asc, desc, eq, gte, inArray, isNull, like, or, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import type { LotSummary } from '#shared/contracts/lots'
import type { LotState } from '#shared/compute/lifecycle/lot'
import type { Reader } from '../../database/client'
import { lots, samples } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import { papers } from '../../database/schema/papers'
import { parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'

export interface LotFilter {
  states?: readonly LotState[]
  supplierId?: number
  /** Part of a lot number, receipt number, supplier, part or serial. */
  text?: string
  decidedSince?: string
  sort?: { column: 'receivedAt' | 'supplierLot' | 'supplier' | 'part' | 'state' | 'quantity'; descending: boolean }
  limit?: number
  offset?: number
}

const SORT_COLUMNS = { receivedAt: lots.receivedAt, supplierLot: lots.supplierLot, supplier: suppliers.name, part: parts.number, state: lots.state, quantity: lots.quantity } as const

/** Lots in short, filtered, sorted and paged in the database; by default the oldest first. */
export function listLotSummaries(db: Pick<Reader, 'select' | 'selectDistinct'>, filter: LotFilter): { rows: LotSummary[]; total: number } {
  const where = conditions(db, filter)
  const sort = filter.sort ?? { column: 'receivedAt' as const, descending: false }
  const column = SORT_COLUMNS[sort.column]
  const from = () => db.select({ lot: lots, supplier: suppliers.name, partNumber: parts.number, partName: parts.name, paperNumber: papers.number }).from(lots)
    .innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId)).leftJoin(papers, and(eq(papers.lotId, lots.id), eq(papers.state, 'issued')))
  const page = from().where(where).orderBy(sort.descending ? desc(column) : asc(column), asc(lots.id)).limit(filter.limit ?? 100).offset(filter.offset ?? 0).all()
  const total = db.select({ n: sql<number>`count(*)` }).from(lots).innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).innerJoin(parts, eq(parts.id, lots.partId)).where(where).get()!.n
  const progress = progressOf(db, page.map(row => row.lot.id))
  return {
    total,
    rows: page.map(row => ({
      number: row.lot.number, supplierLot: row.lot.supplierLot, supplier: row.supplier, partNumber: row.partNumber, partName: row.partName, quantity: row.lot.quantity,
      state: row.lot.state, receivedAt: row.lot.receivedAt, sampleSize: row.lot.plan.n, paperNumber: row.paperNumber,
      measured: progress.get(row.lot.id)?.measured ?? 0, nonconforming: progress.get(row.lot.id)?.nonconforming ?? 0,
    })),
  }
}

function conditions(db: Pick<Reader, 'selectDistinct'>, filter: LotFilter): SQL | undefined {
  const list: (SQL | undefined)[] = []
  if (filter.states) list.push(inArray(lots.state, [...filter.states]))
  if (filter.supplierId !== undefined) list.push(eq(lots.supplierId, filter.supplierId))
  if (filter.decidedSince) list.push(gte(lots.decidedAt, filter.decidedSince))
  if (filter.text) {
    const pattern = `%${filter.text.replaceAll(/[%_]/g, '')}%`
    const bySerial = db.selectDistinct({ id: samples.lotId }).from(samples).where(like(samples.serial, pattern))
    list.push(or(like(lots.supplierLot, pattern), like(lots.number, pattern), like(suppliers.name, pattern), like(parts.number, pattern), like(parts.name, pattern), like(lots.orderNumber, pattern), inArray(lots.id, bySerial)))
  }
  return and(...list)
}

/** Motors judged and nonconforming per lot, counting the first attempt of each that was not voided. */
function progressOf(db: Pick<Reader, 'select'>, lotIds: number[]): Map<number, { measured: number; nonconforming: number }> {
  if (lotIds.length === 0) return new Map()
  const first = db.select({ sampleId: measurements.sampleId, attempt: sql<number>`min(${measurements.attempt})`.as('first_attempt') }).from(measurements)
    .where(and(inArray(measurements.lotId, lotIds), isNull(measurements.voidedAt))).groupBy(measurements.sampleId).as('first')
  const rows = db.select({
    lotId: measurements.lotId,
    measured: sql<number>`sum(${measurements.verdict} is not null)`,
    nonconforming: sql<number>`coalesce(sum(${measurements.verdict} in ('fail', 'conditional-fail')), 0)`,
  }).from(measurements).innerJoin(first, and(eq(first.sampleId, measurements.sampleId), eq(first.attempt, measurements.attempt))).groupBy(measurements.lotId).all()
  return new Map(rows.map(row => [row.lotId, row]))
}
