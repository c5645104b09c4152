import type { DockAnswer } from '#shared/contracts/lots'
import type { Context } from '../context'
import { listLotSummaries } from './summaries'

/** How long a decided lot stays on the Dock, days. */
const DECIDED_SHOWN_DAYS = 3
const DAY_MS = 86_400_000

/** The lots here now (rejected ones until their disposition), oldest first, and those decided in the last days, newest first. */
export function listDock(context: Context): DockAnswer {
  const since = new Date(context.clock().getTime() - DECIDED_SHOWN_DAYS * DAY_MS).toISOString()
  return {
    waiting: listLotSummaries(context.db, { states: ['received', 'drawn', 'measuring', 'ready', 'on-hold'], limit: 200 }).rows,
    decided: listLotSummaries(context.db, { decidedSince: since, sort: { column: 'receivedAt', descending: true }, limit: 20 }).rows,
  }
}
