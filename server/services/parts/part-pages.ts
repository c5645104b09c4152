import { asc, desc, eq } from 'drizzle-orm'
import { describeSheetChanges } from '#shared/compute/judging/sheet-changes'
import { designOrder } from '#shared/compute/motor/design-order'
import type { PartPage, PartRow, SheetView } from '#shared/contracts/parts'
import { limitSheets, partSuppliers, parts } from '../../database/schema/parts'
import { people, suppliers } from '../../database/schema/people'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'

/** All parts in short. */
export function listParts(context: Context): PartRow[] {
  return context.db.select().from(parts).orderBy(asc(parts.number)).all().map(part => rowOf(context, part))
}

/** A part with all its sheets, the newest first. */
export function getPartPage(context: Context, number: string): PartPage {
  const part = context.db.select().from(parts).where(eq(parts.number, number)).get()
  if (!part) throw new DomainError('not-found', `There is no part ${number}. Look it up under Limits.`)
  const { torqueConstantNmPerA, phaseResistanceOhm, rotorInertiaKgM2 } = part
  return { ...rowOf(context, part), torqueConstantNmPerA, phaseResistanceOhm, rotorInertiaKgM2, deliveredBy: deliverers(context, part.id), sheets: sheetsOf(context, part.id) }
}

function rowOf(context: Context, part: typeof parts.$inferSelect): PartRow {
  const sheets = context.db.select().from(limitSheets).where(eq(limitSheets.partId, part.id)).all()
  return {
    number: part.number, name: part.name, revision: part.revision, design: part.design, designOrder: designOrder(part.design), ratedTorqueNm: part.ratedTorqueNm,
    suppliers: deliverers(context, part.id).map(row => row.name), sheetInForce: inForce(context, sheets)?.version ?? null,
    drafts: sheets.filter(sheet => sheet.state === 'draft' || sheet.state === 'submitted').length,
  }
}

function deliverers(context: Context, partId: number): PartPage['deliveredBy'] {
  return context.db.select({ code: suppliers.code, name: suppliers.name, supplierPartNumber: partSuppliers.supplierPartNumber, unitPrice: partSuppliers.unitPrice })
    .from(partSuppliers).innerJoin(suppliers, eq(suppliers.id, partSuppliers.supplierId)).where(eq(partSuppliers.partId, partId)).orderBy(asc(suppliers.name)).all()
}

function inForce(context: Context, sheets: (typeof limitSheets.$inferSelect)[]) {
  const at = now(context)
  return sheets.filter(sheet => sheet.state === 'approved' && sheet.effectiveFrom !== null && sheet.effectiveFrom <= at)
    .sort((a, b) => b.effectiveFrom!.localeCompare(a.effectiveFrom!) || b.version - a.version)[0]
}

function sheetsOf(context: Context, partId: number): SheetView[] {
  const sheets = context.db.select().from(limitSheets).where(eq(limitSheets.partId, partId)).orderBy(desc(limitSheets.version)).all()
  const names = new Map(context.db.select({ id: people.id, name: people.name }).from(people).all().map(person => [person.id, person.name]))
  const current = inForce(context, sheets)
  return sheets.map((sheet, index) => {
    const { id, version, state, content, reason, authorId, createdAt, submittedAt, approvedAt, approvalReason, effectiveFrom, retiredAt } = sheet
    return {
      id, version, state, content, reason, authorId, createdAt, submittedAt, approvedAt, approvalReason, effectiveFrom, retiredAt, author: names.get(authorId) ?? '',
      approvedBy: sheet.approvedById === null ? null : names.get(sheet.approvedById) ?? '', inForce: sheet.id === current?.id, changes: describeSheetChanges(sheets[index + 1]?.content ?? null, content),
    }
  })
}
