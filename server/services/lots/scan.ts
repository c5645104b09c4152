import { and, desc, eq, or } from 'drizzle-orm'
import { parseLabel } from '#shared/compute/intake/label/parse-label'
import type { LabelRead } from '#shared/compute/intake/label/label-reading'
import type { ReceivingPrefill, ScanAnswer } from '#shared/contracts/lots'
import { lots, samples } from '../../database/schema/lots'
import { papers } from '../../database/schema/papers'
import { partSuppliers, parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { nonconformances } from '../../database/schema/returns'
import { rigs } from '../../database/schema/rigs'
import type { Context } from '../context'

/**
 * What a scanned or typed text leads to: a known lot, motor, paper, nonconformance or rig is opened; a label of a delivery not yet received opens the
 * receiving form; each wrong thing gets a sentence of its own.
 */
export function scan(context: Context, text: string): ScanAnswer {
  const known = findKnown(context, text.trim())
  if (known.length === 1) return { kind: 'open', ...known[0]! }
  if (known.length > 1) return { kind: 'choose', choices: known }
  const label = parseLabel(text)
  if (!label.ok) return { kind: 'problem', problems: label.faults, form: null }
  if (label.kind === 'plain' && label.elements.length === 0) return { kind: 'problem', problems: [{ sentence: `Nothing here is called “${text.trim()}”.`, remedy: 'Scan the label of the delivery, or type a lot, a motor’s serial, a paper or a rig.' }], form: null }
  return resolveLabel(context, label)
}

function resolveLabel(context: Context, reading: LabelRead): ScanAnswer {
  if (reading.serial && !reading.lot) {
    const motors = findMotors(context, reading.serial)
    if (motors.length === 1) return { kind: 'open', ...motors[0]! }
    if (motors.length > 1) return { kind: 'choose', choices: motors }
  }
  const { part, supplier, problems } = identify(context, reading)
  if (reading.lot) {
    const received = context.db.select({ number: lots.number, supplierLot: lots.supplierLot }).from(lots)
      .where(and(eq(lots.supplierLot, reading.lot), part ? eq(lots.partId, part.id) : undefined, supplier ? eq(lots.supplierId, supplier.id) : undefined)).all()
    if (received.length === 1) return { kind: 'open', link: `/lots/${received[0]!.number}`, what: `Lot ${received[0]!.supplierLot}` }
    if (received.length > 1) return { kind: 'choose', choices: received.map(row => ({ link: `/lots/${row.number}`, what: `Lot ${row.supplierLot}, receipt ${row.number}` })) }
  }
  if (!reading.lot) problems.push({ sentence: 'The label names no lot (identifier 1T in ISO/IEC 15434, 10 in GS1).', remedy: 'Scan the lot label of the delivery, or type the lot number into the form.' })
  const form: ReceivingPrefill = {
    supplierCode: supplier?.code ?? '', partNumber: part?.number ?? '', supplierLot: reading.lot ?? '', quantity: reading.quantity ?? null, orderNumber: reading.orderNumber ?? '',
  }
  if (problems.length > 0) return { kind: 'problem', problems, form }
  return { kind: 'receive', form, notes: reading.remarks.map(remark => remark.sentence) }
}

/** Part and supplier that a label names, and a sentence for each that is not known. */
function identify(context: Context, reading: LabelRead) {
  const problems: { sentence: string; remedy: string }[] = []
  const { db } = context
  const supplier = reading.supplier ? db.select().from(suppliers).where(eq(suppliers.code, reading.supplier)).get() : undefined
  if (reading.supplier && !supplier) problems.push({ sentence: `No supplier has the code ${reading.supplier}.`, remedy: 'Choose the supplier in the form, or ask the administrator to add it.' })
  let part = reading.part ? db.select().from(parts).where(eq(parts.number, reading.part)).get() : undefined
  if (!part && reading.supplierPart) {
    part = db.select({ part: parts }).from(partSuppliers).innerJoin(parts, eq(parts.id, partSuppliers.partId))
      .where(and(eq(partSuppliers.supplierPartNumber, reading.supplierPart), supplier ? eq(partSuppliers.supplierId, supplier.id) : undefined)).get()?.part
  }
  const named = reading.part ?? reading.supplierPart
  if (named && !part) problems.push({ sentence: `Part ${named} is not known here.`, remedy: 'Check that the delivery is for this plant. A quality engineer adds parts under Limits.' })
  if (!named) problems.push({ sentence: 'The label names no part.', remedy: 'Choose the part in the form.' })
  const deliverers = part ? db.select({ supplier: suppliers }).from(partSuppliers).innerJoin(suppliers, eq(suppliers.id, partSuppliers.supplierId)).where(eq(partSuppliers.partId, part.id)).all() : []
  if (part && supplier && !deliverers.some(row => row.supplier.id === supplier.id)) problems.push({ sentence: `${supplier.name} is not a supplier of part ${part.number}.`, remedy: 'Check the label; a quality engineer can add the supplier to the part.' })
  const only = supplier ?? (deliverers.length === 1 && !reading.supplier ? deliverers[0]!.supplier : undefined)
  return { part, supplier: only, problems }
}

/** Things whose own number the text is. */
function findKnown(context: Context, text: string): { link: string; what: string }[] {
  if (text === '' || text.length > 200) return []
  const { db } = context
  const upper = text.toUpperCase()
  const paper = db.select({ number: papers.number }).from(papers).where(or(eq(papers.number, upper), eq(papers.token, checkToken(text)))).get()
  const nonconformance = db.select({ number: nonconformances.number }).from(nonconformances).where(eq(nonconformances.number, upper)).get()
  const rig = db.select({ code: rigs.code }).from(rigs).where(eq(rigs.code, upper)).get()
  const found = db.select({ number: lots.number, supplierLot: lots.supplierLot, supplier: suppliers.name }).from(lots).innerJoin(suppliers, eq(suppliers.id, lots.supplierId))
    .where(or(eq(lots.number, text), eq(lots.supplierLot, text), eq(lots.supplierLot, upper))).all()
  return [
    ...found.map(row => ({ link: `/lots/${row.number}`, what: `Lot ${row.supplierLot} of ${row.supplier}` })),
    ...findMotors(context, text),
    ...(paper ? [{ link: `/papers/${paper.number}`, what: `Paper ${paper.number}` }] : []),
    ...(nonconformance ? [{ link: `/returns/${nonconformance.number}`, what: `Nonconformance ${nonconformance.number}` }] : []),
    ...(rig ? [{ link: `/rigs/${rig.code}`, what: `Rig ${rig.code}` }] : []),
  ]
}

function findMotors(context: Context, serial: string): { link: string; what: string }[] {
  return context.db.select({ number: lots.number, supplierLot: lots.supplierLot, serial: samples.serial }).from(samples).innerJoin(lots, eq(lots.id, samples.lotId))
    .where(or(eq(samples.serial, serial), eq(samples.serial, serial.toUpperCase()))).orderBy(desc(lots.id)).limit(10).all()
    .map(row => ({ link: `/lots/${row.number}/motors/${encodeURIComponent(row.serial!)}`, what: `Motor ${row.serial} of lot ${row.supplierLot}` }))
}

/** The token in a check page's address, as a QR code of one of our papers gives it. */
function checkToken(text: string): string {
  return /\/check\/([0-9a-f]{32})$/.exec(text)?.[1] ?? ''
}
