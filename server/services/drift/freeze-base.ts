import { and, eq, max } from 'drizzle-orm'
import type { z } from 'zod'
import { isCharacteristicKey } from '#shared/compute/judging/characteristics'
import type { freezeBaseSchema } from '#shared/contracts/drift'
import { driftBases } from '../../database/schema/drift'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { getSupplierAndPart } from '../lots/receive-lot'
import { appendToLogbook } from '../logbook/append'

/** Freezes the base period of a chart. Earlier ones stay on record; the newest counts. */
export function freezeBase(context: Context, input: z.output<typeof freezeBaseSchema>): { version: number } {
  const { supplier, part } = getSupplierAndPart(context.db, input.supplier, input.part)
  if (!isCharacteristicKey(input.key)) throw new DomainError('invalid-input', 'There is no such characteristic.', { fields: [{ field: 'key', message: 'Choose a characteristic.' }] })
  return context.db.transaction((tx) => {
    const last = tx.select({ version: max(driftBases.version) }).from(driftBases).where(and(eq(driftBases.supplierId, supplier.id), eq(driftBases.partId, part.id), eq(driftBases.key, input.key))).get()?.version ?? 0
    const version = last + 1
    tx.insert(driftBases).values({ supplierId: supplier.id, partId: part.id, key: input.key, version, fromDate: input.fromDate, toDate: input.toDate, reason: input.reason, frozenById: context.actor.personId, frozenAt: now(context) }).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'drift.base-frozen', subjectKind: 'drift', subjectId: `${supplier.code}/${part.number}/${input.key}`, content: { version, fromDate: input.fromDate, toDate: input.toDate } })
    return { version }
  }, { behavior: 'immediate' })
}
