import QRCode from 'qrcode'
import type { PaperRecord } from '#shared/contracts/paper-record'
import { INK, LINE, PAGE, SOFT } from './sheet'
import type { Sheet } from './sheet'
import type { TimeFormat } from './times'

const QR_SIDE = 96
const CAUTIONS = 'A verdict is about conformity to the buyer’s limits, not about the safety of the product in which the motor is used. Spinning shafts catch fingers, hair and lanyards; strong magnets pinch and affect implants; a motor that is turned generates voltage; hot windings burn. Follow site rules; leave electrical work to qualified people.'
const MISSING = 'A sign that this paper’s typefaces lack is shown as □; the attached record holds the text as it was written.'

export interface Seal { recordSha256: string; signature: string; keyId: string; rawFilesAttached: boolean }

/** Who decided, how to check the paper, what it is sealed with, and the cautions. */
export function drawSignature(sheet: Sheet, record: PaperRecord, seal: Seal, time: TimeFormat): void {
  sheet.need(290)
  sheet.heading('Decision and signature')
  drawSigner(sheet, record, time)
  drawCheck(sheet, record, seal)
  const hashes = [['Record SHA-256', seal.recordSha256], [`Signature of the record (Ed25519, key ${seal.keyId})`, seal.signature], ['SHA-256 of the evidence signed for', record.decision.evidenceHash], [`Logbook at issue, entry ${record.logbook.sequence}`, record.logbook.entryHash || 'none before it']] as const
  for (const [name, value] of hashes) {
    sheet.need(20)
    sheet.y -= 9
    sheet.text(name, PAGE.left, sheet.y, { size: 7, colour: SOFT })
    sheet.paragraph(value, { size: 7, face: 'mono', after: 1.5 })
  }
  sheet.y -= 5
  sheet.paragraph(`${CAUTIONS}${sheet.lacksSigns ? ` ${MISSING}` : ''}`, { size: 7.4, colour: SOFT })
}

function drawSigner(sheet: Sheet, record: PaperRecord, time: TimeFormat): void {
  const { decision } = record
  const width = PAGE.right - PAGE.left - 24
  const meaning = sheet.wrap(`“${decision.meaning}”`, width, { size: 9 })
  const height = 36 + 12.5 * meaning.length
  const top = sheet.y - 2
  sheet.need(height + 8)
  sheet.page.drawRectangle({ x: PAGE.left, y: top - height, width: PAGE.right - PAGE.left, height, borderColor: LINE, borderWidth: 0.8 })
  sheet.text(decision.signedBy, PAGE.left + 12, top - 18, { size: 12, face: 'bold' })
  sheet.text(`${time(decision.signedAt)} (${record.timeZone})`, PAGE.right - 12, top - 17, { size: 9, align: 'right' })
  sheet.text(`signed electronically with a password: ${decision.outcome}`, PAGE.left + 12, top - 30, { size: 7.8, colour: SOFT })
  meaning.forEach((line, index) => sheet.text(line, PAGE.left + 12, top - 44 - 12.5 * index, { size: 9 }))
  sheet.y = top - height - 12
}

function drawCheck(sheet: Sheet, record: PaperRecord, seal: Seal): void {
  const top = sheet.y
  drawCode(sheet, record.checkAddress, PAGE.right - QR_SIDE, top)
  const width = PAGE.right - PAGE.left - QR_SIDE - 18
  const steps = [
    'Scan the code or open the address: the page needs no account and says whether this certificate is valid, superseded or withdrawn.',
    'There your own device compares this file, recomputes every figure from the raw data, and verifies the record and its signature.',
    seal.rawFilesAttached ? 'Without network: the record (record.json) and the raw files are attached to this PDF.' : 'Without network: the record (record.json) is attached to this PDF and names every raw file by its SHA-256.',
  ]
  sheet.text('How to check this certificate', PAGE.left, top - 10, { face: 'bold', size: 9.5 })
  sheet.y = top - 14
  steps.forEach((step, index) => {
    const lines = sheet.wrap(step, width - 14, { size: 8.4 })
    sheet.text(`${index + 1}`, PAGE.left, sheet.y - 9.5, { size: 8.4, face: 'monoBold', colour: SOFT })
    lines.forEach((line, at) => sheet.text(line, PAGE.left + 14, sheet.y - 9.5 - 11 * at, { size: 8.4 }))
    sheet.y -= 11 * lines.length + 1.5
  })
  sheet.paragraph(record.checkAddress, { x: PAGE.left + 14, width: width - 14, size: 7.4, face: 'mono', after: 2 })
  sheet.y = Math.min(sheet.y, top - QR_SIDE) - 2
}

/** QR code (ISO/IEC 18004), error correction M, four modules of quiet zone, as one vector path. */
function drawCode(sheet: Sheet, text: string, x: number, top: number): void {
  const { modules } = QRCode.create(text, { errorCorrectionLevel: 'M' })
  const quiet = 4
  const unit = QR_SIDE / (modules.size + 2 * quiet)
  let path = ''
  for (let row = 0; row < modules.size; row++) {
    for (let column = 0; column < modules.size; column++) {
      if (!modules.get(row, column)) continue
      const left = (column + quiet) * unit
      const up = (row + quiet) * unit
      path += `M${left.toFixed(3)} ${up.toFixed(3)}H${(left + unit).toFixed(3)}V${(up + unit).toFixed(3)}H${left.toFixed(3)}Z`
    }
  }
  sheet.path(path, x, top, { fill: INK })
}
