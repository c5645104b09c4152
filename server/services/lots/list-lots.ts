import type { z } from 'zod'
import type { LotListAnswer, lotListSchema } from '#shared/contracts/lots'
import type { LotState } from '#shared/compute/lifecycle/lot'
import type { Context } from '../context'
import { listLotSummaries } from './summaries'

const PAGE_SIZE = 25

/** States behind the words of the filter. */
const STATES: Record<string, readonly LotState[]> = {
  waiting: ['received', 'drawn', 'measuring', 'ready'],
  accepted: ['accepted'],
  rejected: ['rejected', 'on-hold', 'dispositioned'],
  closed: ['closed'],
}

/** One page of all lots; a supplier's contact gets its own company's. */
export function listLots(context: Context, query: z.output<typeof lotListSchema>): LotListAnswer {
  const { rows, total } = listLotSummaries(context.db, {
    text: query.text, states: STATES[query.state], supplierId: context.actor.role === 'supplier' ? context.actor.supplierId ?? -1 : undefined,
    sort: { column: query.sort, descending: query.order === 'falling' }, limit: PAGE_SIZE, offset: (query.page - 1) * PAGE_SIZE,
  })
  return { rows, total, pageSize: PAGE_SIZE }
}
