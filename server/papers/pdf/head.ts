import { formatCount } from '#shared/compute/sampling/wording'
import type { MotorDesign } from '#shared/compute/terms/motor'
import type { PaperRecord } from '#shared/contracts/paper-record'
import { drawBrand, drawVerdict } from './marks'
import { FAIL, INK, PAGE, SOFT } from './sheet'
import type { Sheet } from './sheet'
import type { Fact } from './tables'
import type { TimeFormat } from './times'

/** Brand, title, number and the verdict with the counts it rests on. */
export function drawHead(sheet: Sheet, record: PaperRecord, time: TimeFormat): void {
  const accepted = record.decision.outcome === 'accepted'
  drawBrand(sheet, PAGE.left, PAGE.top + 6, 20)
  sheet.text('Evenlot', PAGE.left + 26, PAGE.top - 9, { size: 13, face: 'bold' })
  const buyer = sheet.wrap(record.buyer, 360, { size: 9, face: 'bold' })
  buyer.forEach((line, index) => sheet.text(line, PAGE.right, PAGE.top - 4 + 11 * (buyer.length - 1 - index), { size: 9, face: 'bold', align: 'right' }))
  sheet.text('Incoming inspection of motors', PAGE.right, PAGE.top - 15, { size: 8, colour: SOFT, align: 'right' })
  sheet.y = PAGE.top - 30
  sheet.rule(sheet.y, PAGE.left, PAGE.right, INK, 1)
  sheet.y -= 32
  sheet.text(`Certificate of ${accepted ? 'acceptance' : 'rejection'}`, PAGE.left, sheet.y, { size: 22, face: 'bold' })
  sheet.text(record.number, PAGE.right, sheet.y, { size: 14, face: 'monoBold', align: 'right' })
  sheet.y -= 15
  sheet.text('Inspection certificate, content in the style of EN 10204 type 3.1', PAGE.left, sheet.y, { size: 8.6, colour: SOFT })
  sheet.text(`issued ${time(record.issuedAt)}`, PAGE.right, sheet.y, { size: 8.6, colour: SOFT, align: 'right' })
  drawOutcome(sheet, record)
}

/** The verdict large, and beside it one line for each class. */
function drawOutcome(sheet: Sheet, record: PaperRecord): void {
  const accepted = record.decision.outcome === 'accepted'
  const { classes } = record.lotVerdict
  const height = Math.max(34, 12 * (classes.length + 1) + 8)
  const top = sheet.y - 12
  drawVerdict(sheet, accepted ? 'pass' : 'fail', PAGE.left, top - height / 2 - 8, { size: 22, face: 'bold', word: accepted ? 'Accepted' : 'Rejected' })
  const start = PAGE.right - 178
  sheet.text('Nonconforming motors', start, top - 11, { size: 7.6, face: 'bold', colour: SOFT })
  classes.forEach((row, index) => {
    const y = top - 24 - 12 * index
    const over = row.nonconforming >= row.re
    const colour = over ? FAIL : INK
    sheet.text(row.class, start, y, { size: 8.8, colour })
    sheet.text(String(row.nonconforming), start + 66, y, { size: 8.8, face: over ? 'monoBold' : 'mono', colour, align: 'right' })
    sheet.text(`accept on ${row.ac}, reject on ${row.re}`, PAGE.right, y, { size: 8, colour: SOFT, align: 'right' })
  })
  sheet.y = top - height - 2
  sheet.rule()
  sheet.y -= 4
}

function designText(design: MotorDesign): string {
  switch (design.kind) {
    case 'brushless': return `${design.slots} slots, ${design.poles} poles`
    case 'hybrid stepper': return `hybrid stepper, ${design.rotorTeeth} rotor teeth`
    case 'claw-pole stepper': return `claw-pole stepper, ${design.polePairs} pole pairs`
  }
}

/** Who bought what from whom, and when it came. */
export function facts(record: PaperRecord, time: TimeFormat): Fact[] {
  const { supplier, part, lot } = record
  return [
    ['Buyer', record.buyer], ['Supplier', `${supplier.name}${supplier.address ? `, ${supplier.address.replaceAll(/\s*\n\s*/g, ', ')}` : ''}`],
    ['Part', `${part.number}, revision ${part.revision || 'not stated'}`, 'mono'], ['Motor', `${part.name}; ${designText(part.design)}`],
    ['Rated torque', part.ratedTorqueNm === null ? 'not stated' : `${Number((part.ratedTorqueNm * 1e3).toPrecision(6))} mN·m`, part.ratedTorqueNm === null ? 'sans' : 'mono'],
    ['Lot', lot.supplierLot, 'mono'], ['Receipt', `${lot.receipt}${lot.resubmissionOf ? `, re-submission of ${lot.resubmissionOf}` : ''}`, 'mono'], ['Order', lot.orderNumber || 'not stated', lot.orderNumber ? 'mono' : 'sans'],
    ['Quantity', `${formatCount(lot.quantity)} motors`, 'mono'], ['Received', `${time(lot.receivedAt)} by ${lot.receivedBy}`],
  ]
}
