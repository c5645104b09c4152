import { and, eq } from 'drizzle-orm'
import { drawSample, DRAW_GENERATOR } from '#shared/compute/sampling/draw'
import { makePlan } from '#shared/compute/sampling/plan'
import { receiveLotSchema } from '#shared/contracts/lots'
import type { ReceiveLot } from '#shared/contracts/lots'
import { plantYear, takeNumber } from '../../database/counters'
import type { Reader, Transaction } from '../../database/client'
import { lots, lotSerials, samples } from '../../database/schema/lots'
import { partSuppliers, parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { now, randomHex } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { getSheetInForce, limitedClasses } from '../parts/sheet-in-force'
import { severityOfNextLot } from './severity'

/**
 * Receives a lot: works out the plan by the sheet in force and the severity the switching rules give, draws the sample by a new stored seed, and
 * writes lot, sample and logbook entry in one transaction.
 *
 * @returns the receipt number.
 * @throws DomainError `invalid-input` (unknown supplier or part, serials that do not fit the quantity), `conflict` (this lot was received before; `link` leads
 *   to it), `refused` (no approved sheet, inspection discontinued).
 */
export function receiveLot(context: Context, input: ReceiveLot): { number: string } {
  const delivery = receiveLotSchema.parse(input)
  const { supplier, part } = getSupplierAndPart(context.db, delivery.supplierCode, delivery.partNumber)
  checkSerials(delivery.serials, delivery.quantity)
  const drawSeed = randomHex(context, 16)
  return context.db.transaction((tx) => {
    refuseSecondReceipt(tx, supplier.id, part.id, delivery.supplierLot)
    const at = now(context)
    const sheet = getSheetInForce(tx, part, at)
    const severity = severityOfNextLot(tx, { supplierId: supplier.id, partId: part.id })
    const plan = makePlan({ lotSize: delivery.quantity, scheme: sheet.content.sampling, severity: severity.severity, limited: limitedClasses(sheet.content) })
    const number = nextReceiptNumber(context, tx)
    const lot = tx.insert(lots).values({
      number, supplierId: supplier.id, partId: part.id, supplierLot: delivery.supplierLot, quantity: delivery.quantity, orderNumber: delivery.orderNumber,
      unitPrice: delivery.unitPrice, remarks: delivery.remarks, state: 'drawn', sheetId: sheet.id, severity: severity.severity, severityReason: severity.reason,
      plan, drawSeed, drawGenerator: DRAW_GENERATOR, resubmissionOfId: findRejectedLot(tx, delivery.resubmissionOf, supplier.id, part.id),
      receivedById: context.actor.personId, receivedAt: at,
    }).returning().get()
    writeSample(tx, lot, delivery.serials)
    appendToLogbook(context, tx, {
      actorId: context.actor.personId, action: 'lot.received', subjectKind: 'lot', subjectId: number,
      content: { supplierId: supplier.id, partId: part.id, supplierLot: delivery.supplierLot, quantity: delivery.quantity, sheetId: sheet.id, severity: severity.severity, n: plan.n, drawSeed, drawGenerator: DRAW_GENERATOR },
    })
    return { number }
  }, { behavior: 'immediate' })
}

/** @throws DomainError `invalid-input` when either is unknown or the supplier does not deliver the part. */
export function getSupplierAndPart(db: Pick<Reader, 'select'>, supplierCode: string, partNumber: string) {
  const supplier = db.select().from(suppliers).where(eq(suppliers.code, supplierCode)).get()
  if (!supplier) throw fieldFault('supplierCode', `There is no supplier ${supplierCode}. Choose one from the list, or ask the administrator to add it.`)
  const part = db.select().from(parts).where(eq(parts.number, partNumber)).get()
  if (!part) throw fieldFault('partNumber', `There is no part ${partNumber}. Choose one from the list, or ask a quality engineer to add it under Limits.`)
  const delivered = db.select().from(partSuppliers).where(and(eq(partSuppliers.partId, part.id), eq(partSuppliers.supplierId, supplier.id))).get()
  if (!delivered) throw fieldFault('partNumber', `${supplier.name} is not a supplier of part ${part.number}. Check the label, or ask a quality engineer to add the supplier to the part.`)
  return { supplier, part }
}

function fieldFault(field: string, message: string): DomainError {
  return new DomainError('invalid-input', message, { fields: [{ field, message }] })
}

function checkSerials(serials: string[], quantity: number): void {
  if (serials.length === 0) return
  if (serials.length !== quantity) throw fieldFault('serials', `The list holds ${serials.length} serial numbers, but the lot has ${quantity} motors. Correct the list or the quantity.`)
  const seen = new Map<string, number>()
  serials.forEach((serial, index) => {
    const key = serial.toUpperCase()
    const earlier = seen.get(key)
    if (earlier !== undefined) throw fieldFault('serials', `Serial ${serial} stands in the list twice, in lines ${earlier + 1} and ${index + 1}. A serial belongs to one motor.`)
    seen.set(key, index)
  })
}

function refuseSecondReceipt(tx: Transaction, supplierId: number, partId: number, supplierLot: string): void {
  const earlier = tx.select({ number: lots.number }).from(lots).where(and(eq(lots.supplierId, supplierId), eq(lots.partId, partId), eq(lots.supplierLot, supplierLot))).get()
  if (earlier) throw new DomainError('conflict', `Lot ${supplierLot} of this part was received before, as ${earlier.number}. Nothing was written; open that lot.`, { link: `/lots/${earlier.number}` })
}

function findRejectedLot(tx: Transaction, number: string | null, supplierId: number, partId: number): number | null {
  if (number === null || number === '') return null
  const earlier = tx.select().from(lots).where(eq(lots.number, number)).get()
  if (!earlier || earlier.supplierId !== supplierId || earlier.partId !== partId) throw fieldFault('resubmissionOf', `There is no lot ${number} of this supplier and part to re-submit.`)
  const rejected = ['rejected', 'on-hold', 'dispositioned', 'closed'].includes(earlier.state)
  if (!rejected) throw fieldFault('resubmissionOf', `Lot ${number} was not rejected, so it cannot be re-submitted.`)
  return earlier.id
}

function nextReceiptNumber(context: Context, tx: Transaction): string {
  const year = plantYear(context.clock(), context.settings.plantTimeZone) % 100
  return `${String(year).padStart(2, '0')}-${String(takeNumber(tx, `lot:${year}`)).padStart(4, '0')}`
}

/** SQLite takes at most 32 766 values a statement. */
const ROWS_A_STATEMENT = 5_000

function writeSample(tx: Transaction, lot: typeof lots.$inferSelect, serials: string[]): void {
  for (let from = 0; from < serials.length; from += ROWS_A_STATEMENT) {
    const rows = serials.slice(from, from + ROWS_A_STATEMENT).map((serial, index) => ({ lotId: lot.id, position: from + index + 1, serial }))
    tx.insert(lotSerials).values(rows).run()
  }
  const positions = drawSample({ lotSize: lot.quantity, n: lot.plan.n, seed: lot.drawSeed })
  for (let from = 0; from < positions.length; from += ROWS_A_STATEMENT) {
    const rows = positions.slice(from, from + ROWS_A_STATEMENT).map((position, index) => ({ lotId: lot.id, drawOrder: from + index + 1, position, serial: serials[position - 1] ?? null }))
    tx.insert(samples).values(rows).run()
  }
}
