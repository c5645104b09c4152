import { and, eq, inArray, ne } from 'drizzle-orm'
import { partSchema } from '#shared/contracts/parts'
import type { PartInput } from '#shared/contracts/parts'
import type { Transaction } from '../../database/client'
import { lots } from '../../database/schema/lots'
import { partSuppliers, parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'

/** Adds a part with its suppliers. */
export function addPart(context: Context, input: PartInput): { number: string } {
  const part = partSchema.parse(input)
  return context.db.transaction((tx) => {
    refuseTakenNumber(tx, part.number, 0)
    const { suppliers: delivered, ...fields } = part
    const row = tx.insert(parts).values({ ...fields, createdAt: now(context) }).returning().get()
    writeSuppliers(tx, row.id, delivered)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'part.added', subjectKind: 'part', subjectId: row.number, content: { design: row.design as unknown as Record<string, unknown>, ratedTorqueNm: row.ratedTorqueNm } })
    return { number: row.number }
  }, { behavior: 'immediate' })
}

/**
 * Changes a part. Slots, poles or teeth and the rated torque stay as they are once lots were received: their figures depend on them.
 */
export function changePart(context: Context, number: string, input: PartInput): { number: string } {
  const part = partSchema.parse(input)
  return context.db.transaction((tx) => {
    const row = tx.select().from(parts).where(eq(parts.number, number)).get()
    if (!row) throw new DomainError('not-found', `There is no part ${number}.`)
    refuseTakenNumber(tx, part.number, row.id)
    const used = tx.select({ id: lots.id }).from(lots).where(eq(lots.partId, row.id)).limit(1).get()
    const sameMotor = JSON.stringify(part.design) === JSON.stringify(row.design) && part.ratedTorqueNm === row.ratedTorqueNm
    if (used && !sameMotor) throw new DomainError('conflict', 'Lots of this part were judged with these slots, poles and rated torque; they cannot change. Add a new part or revision instead.', { fields: [{ field: 'design', message: 'In use.' }] })
    const { suppliers: delivered, ...fields } = part
    tx.update(parts).set(fields).where(eq(parts.id, row.id)).run()
    tx.delete(partSuppliers).where(eq(partSuppliers.partId, row.id)).run()
    writeSuppliers(tx, row.id, delivered)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'part.changed', subjectKind: 'part', subjectId: part.number })
    return { number: part.number }
  }, { behavior: 'immediate' })
}

function refuseTakenNumber(tx: Transaction, number: string, exceptId: number): void {
  if (tx.select({ id: parts.id }).from(parts).where(and(eq(parts.number, number), ne(parts.id, exceptId))).get()) {
    throw new DomainError('conflict', `Part ${number} exists already.`, { fields: [{ field: 'number', message: 'Exists already.' }], link: `/limits/${number}` })
  }
}

function writeSuppliers(tx: Transaction, partId: number, delivered: { code: string; supplierPartNumber: string; unitPrice: number | null }[]): void {
  if (delivered.length === 0) return
  const known = tx.select().from(suppliers).where(inArray(suppliers.code, delivered.map(row => row.code))).all()
  const rows = delivered.map((row, index) => {
    const supplier = known.find(each => each.code === row.code)
    if (!supplier) throw new DomainError('invalid-input', `There is no supplier ${row.code}.`, { fields: [{ field: `suppliers.${index}.code`, message: 'Unknown supplier.' }] })
    return { partId, supplierId: supplier.id, supplierPartNumber: row.supplierPartNumber, unitPrice: row.unitPrice }
  })
  tx.insert(partSuppliers).values(rows).onConflictDoNothing().run()
}

