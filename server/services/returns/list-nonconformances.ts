import { and, asc, desc, eq, inArray, like, or, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import type { NonconformanceState } from '#shared/compute/lifecycle/nonconformance'
import type { NonconformanceListAnswer, NonconformanceListQuery } from '#shared/contracts/returns'
import { lots } from '../../database/schema/lots'
import { parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { nonconformances } from '../../database/schema/returns'
import type { Context } from '../context'
import { plantDay } from './answer-due'

const PAGE_SIZE = 25

/** States in which the supplier's answer has yet to come. */
const AWAITING_ANSWER: readonly NonconformanceState[] = ['open', 'notified', 'acknowledged', 'sent-back']

/** States behind the words of the filter. */
const STATES: Record<string, readonly NonconformanceState[]> = {
  open: [...AWAITING_ANSWER, 'answered', 'accepted-answer'],
  waiting: AWAITING_ANSWER,
  answered: ['answered'],
  closed: ['closed'],
}

const SORT_COLUMNS = {
  openedAt: nonconformances.openedAt, answerDueOn: nonconformances.answerDueOn, number: nonconformances.number, supplier: suppliers.name, supplierLot: lots.supplierLot, state: nonconformances.state,
} as const

/** Whether the supplier's answer is due and has not come. */
export function isOverdue(nonconformance: { state: NonconformanceState; answerDueOn: string }, today: string): boolean {
  return AWAITING_ANSWER.includes(nonconformance.state) && nonconformance.answerDueOn < today
}

/** One page of the nonconformances, filtered and sorted in the database; a supplier's contact gets its own company's. */
export function listNonconformances(context: Context, query: NonconformanceListQuery): NonconformanceListAnswer {
  const where = conditions(context, query)
  const column = SORT_COLUMNS[query.sort]
  const columns = { row: nonconformances, supplier: suppliers.name, lotNumber: lots.number, supplierLot: lots.supplierLot, partNumber: parts.number, partName: parts.name }
  const rows = context.db.select(columns).from(nonconformances).innerJoin(lots, eq(lots.id, nonconformances.lotId)).innerJoin(suppliers, eq(suppliers.id, nonconformances.supplierId)).innerJoin(parts, eq(parts.id, lots.partId))
    .where(where).orderBy(query.order === 'falling' ? desc(column) : asc(column), asc(nonconformances.id)).limit(PAGE_SIZE).offset((query.page - 1) * PAGE_SIZE).all()
  const total = context.db.select({ n: sql<number>`count(*)` }).from(nonconformances).innerJoin(lots, eq(lots.id, nonconformances.lotId)).innerJoin(suppliers, eq(suppliers.id, nonconformances.supplierId)).innerJoin(parts, eq(parts.id, lots.partId)).where(where).get()!.n
  const today = plantDay(context.clock(), context.settings.plantTimeZone)
  return {
    total, pageSize: PAGE_SIZE,
    suppliers: context.actor.role === 'supplier' ? [] : context.db.selectDistinct({ code: suppliers.code, name: suppliers.name }).from(nonconformances).innerJoin(suppliers, eq(suppliers.id, nonconformances.supplierId)).orderBy(asc(suppliers.name)).all(),
    rows: rows.map(({ row, ...about }) => ({
      number: row.number, state: row.state, openedAt: row.openedAt, answerDueOn: row.answerDueOn, disposition: row.disposition, overdue: isOverdue(row, today), ...about,
    })),
  }
}

function conditions(context: Context, query: NonconformanceListQuery): SQL | undefined {
  const list: (SQL | undefined)[] = []
  const states = STATES[query.state]
  if (context.actor.role === 'supplier') list.push(eq(nonconformances.supplierId, context.actor.supplierId ?? -1))
  if (states) list.push(inArray(nonconformances.state, [...states]))
  if (query.supplier) list.push(eq(suppliers.code, query.supplier))
  if (query.text) {
    const pattern = `%${query.text.replaceAll(/[%_]/g, '')}%`
    list.push(or(like(nonconformances.number, pattern), like(lots.supplierLot, pattern), like(lots.number, pattern), like(suppliers.name, pattern), like(parts.number, pattern), like(parts.name, pattern)))
  }
  return and(...list)
}
