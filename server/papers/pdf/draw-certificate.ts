import { AFRelationship } from 'pdf-lib'
import QRCode from 'qrcode'
import { describeRule } from '#shared/compute/judging/rule'
import type { PaperRecord } from '#shared/contracts/paper-record'
import { drawRosette, drawWorst, nameOf, worstMotor } from './figures'
import type { PaperFonts } from './fonts'
import { drawBrand, drawVerdict } from './marks'
import { FAIL, INK, PAGE, Sheet, SOFT } from './sheet'
import { drawFacts, drawLimits, drawResults } from './tables'

export interface CertificateInput {
  record: PaperRecord
  /** The record's canonical JSON, attached byte for byte. */
  recordText: string
  recordSha256: string
  /** Ed25519, base64. */
  signature: string
  keyId: string
  fonts: PaperFonts
  /** Raw files to attach; null: too large together, the paper names their hashes in the record. */
  rawFiles: { name: string; sha256: string; bytes: Uint8Array }[] | null
}

const METHODS = { 'torque-sensor': 'torque sensor, slow sweep', 'hold': 'hold position', 'spin': 'slow spin' } as const

/** Draws a certificate from its record, and from nothing else: the same record gives the same bytes. */
export async function drawCertificate(input: CertificateInput): Promise<Uint8Array> {
  const { record } = input
  const sheet = await Sheet.create(input.fonts)
  const time = timeFormat(record.timeZone)
  drawHead(sheet, record, time)
  drawFacts(sheet, facts(record, time))
  sheet.heading('Sampling plan')
  sheet.paragraph(record.plan.sentence, { size: 10.5, face: 'bold', after: 2 })
  sheet.paragraph(`${record.severityReason} ${record.lotVerdict.sentence}`, { colour: SOFT })
  drawReason(sheet, record)
  const worst = worstMotor(record)
  if (worst) {
    sheet.heading(`Motor ${nameOf(worst)}: ${worst.verdict === 'fail' || worst.verdict === 'conditional-fail' ? 'the worst of those that fail' : 'nearest to a limit'}`)
    drawWorst(sheet, record, worst)
  }
  sheet.heading(`Limit sheet ${record.sheet.version}`)
  sheet.paragraph(`Written by ${record.sheet.author}, approved by ${record.sheet.approvedBy}${record.sheet.approvedAt ? ` on ${time(record.sheet.approvedAt)}` : ''}. ${describeRule(record.sheet.content.decisionRule)}`, { colour: SOFT, after: 2 })
  drawLimits(sheet, record)
  drawRigs(sheet, record)
  sheet.heading('Results')
  drawResults(sheet, record)
  sheet.heading('All motors of the sample')
  drawRosette(sheet, record)
  sheet.paragraph('Torque around one turn of the shaft, clockwise from the index mark; shaded: limit band; dark: beyond it.', { size: 7.6, colour: SOFT })
  drawSignature(sheet, input, time)
  drawFeet(sheet, record)
  await attach(sheet, input)
  return sheet.document.save({ useObjectStreams: false, addDefaultPage: false })
}

type TimeFormat = (iso: string) => string

function timeFormat(timeZone: string): TimeFormat {
  const format = new Intl.DateTimeFormat('en-GB', { timeZone, day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' })
  return iso => format.format(new Date(iso))
}

function drawHead(sheet: Sheet, record: PaperRecord, time: TimeFormat): void {
  const accepted = record.decision.outcome === 'accepted'
  drawBrand(sheet, PAGE.left, PAGE.top + 6, 20)
  sheet.text('Evenlot', PAGE.left + 26, PAGE.top - 9, { size: 13, face: 'bold' })
  sheet.text(record.buyer, PAGE.right, PAGE.top - 4, { size: 9, face: 'bold', align: 'right' })
  sheet.text('Incoming inspection of motors', PAGE.right, PAGE.top - 15, { size: 8, colour: SOFT, align: 'right' })
  sheet.y = PAGE.top - 30
  sheet.rule(sheet.y, PAGE.left, PAGE.right, INK, 1)
  sheet.y -= 32
  sheet.text(`Certificate of ${accepted ? 'acceptance' : 'rejection'}`, PAGE.left, sheet.y, { size: 22, face: 'bold' })
  sheet.text(record.number, PAGE.right, sheet.y + 5, { size: 14, face: 'monoBold', align: 'right' })
  sheet.y -= 15
  sheet.text('Inspection certificate, content in the style of EN 10204 type 3.1', PAGE.left, sheet.y, { size: 8.6, colour: SOFT })
  sheet.text(`issued ${time(record.issuedAt)}`, PAGE.right, sheet.y, { size: 8.6, colour: SOFT, align: 'right' })
  sheet.y -= 34
  drawVerdict(sheet, accepted ? 'pass' : 'fail', PAGE.left, sheet.y, { size: 20, face: 'bold', word: accepted ? 'Accepted' : 'Rejected' })
  const counts = record.lotVerdict.classes.map(row => `${row.class} ${row.nonconforming} (accept on ${row.ac}, reject on ${row.re})`).join(', ')
  sheet.text(`Nonconforming motors: ${counts}`, PAGE.right, sheet.y + 2, { size: 9, colour: accepted ? INK : FAIL, align: 'right' })
  sheet.y -= 12
  sheet.rule()
  sheet.y -= 4
}

function facts(record: PaperRecord, time: TimeFormat): [string, string, ('mono' | 'sans')?][] {
  const motor = record.part.design.kind === 'brushless' ? `${record.part.design.slots} slots, ${record.part.design.poles} poles` : record.part.design.kind === 'hybrid stepper' ? `hybrid stepper, ${record.part.design.rotorTeeth} rotor teeth` : `claw-pole stepper, ${record.part.design.polePairs} pole pairs`
  return [
    ['Buyer', record.buyer], ['Supplier', `${record.supplier.name}${record.supplier.address ? `, ${record.supplier.address}` : ''}`],
    ['Part', `${record.part.number}${record.part.revision ? `, revision ${record.part.revision}` : ''}`, 'mono'], ['Motor', `${record.part.name}; ${motor}`],
    ['Rated torque', record.part.ratedTorqueNm === null ? 'not stated' : `${Number((record.part.ratedTorqueNm * 1e3).toPrecision(6))} mN·m`, 'mono'],
    ['Lot', record.lot.supplierLot, 'mono'], ['Receipt', `${record.lot.receipt}${record.lot.resubmissionOf ? `, re-submission of ${record.lot.resubmissionOf}` : ''}`, 'mono'], ['Order', record.lot.orderNumber || 'not stated', 'mono'],
    ['Quantity', `${record.lot.quantity} motors`, 'mono'], ['Received', `${time(record.lot.receivedAt)} by ${record.lot.receivedBy}`],
  ]
}

function drawReason(sheet: Sheet, record: PaperRecord): void {
  if (record.decision.overruled) sheet.paragraph(`Rejected against the computed acceptance: ${record.decision.reason}`, { face: 'bold', colour: FAIL })
  if (!record.lotVerdict.complete) sheet.paragraph('The lot was decided before all drawn motors were measured; the sample is incomplete.', { face: 'bold' })
  if (record.explanation.length === 0) return
  sheet.heading('Likely origin')
  for (const sentence of record.explanation) sheet.paragraph(sentence, { after: 2 })
  sheet.y -= 3
}

function drawRigs(sheet: Sheet, record: PaperRecord): void {
  sheet.heading('Measurement')
  if (record.rigs.length === 0) sheet.paragraph('No motor was measured.')
  for (const rig of record.rigs) {
    const { calibration } = rig
    sheet.paragraph(`Rig ${rig.code} (${rig.name}), method: ${METHODS[rig.method]}. Calibration ${calibration.certificateNumber} by ${calibration.laboratory}, ${calibration.performedOn}, due ${calibration.dueOn}; standard uncertainty of torque ${Number((100 * calibration.torqueRelativeUncertainty).toPrecision(3))} % and ${Number((1e6 * calibration.torqueAbsoluteUncertaintyNm).toPrecision(3))} μN·m.`, { after: 2 })
  }
  const versions = [...new Set(record.samples.flatMap(sample => sample.engineVersion ?? []))].join(', ')
  sheet.paragraph(`Evaluation version ${versions || 'not stated'}. Sample drawn by ${record.draw.generator}, seed ${record.draw.seed}.`, { size: 7.8, colour: SOFT })
}

const QR_SIDE = 92

function drawSignature(sheet: Sheet, input: CertificateInput, time: TimeFormat): void {
  const { record } = input
  sheet.need(250)
  sheet.heading('Decision and signature')
  sheet.paragraph(`${record.decision.signedBy} signed electronically with a password on ${time(record.decision.signedAt)}: “${record.decision.meaning}”`, { after: 10 })
  const top = sheet.y
  drawCode(sheet, record.checkAddress, PAGE.right - QR_SIDE, top)
  const width = PAGE.right - PAGE.left - QR_SIDE - 22
  sheet.text('How to check this certificate', PAGE.left, top - 10, { face: 'bold', size: 9.5 })
  sheet.y = top - 13
  for (const line of ['Scan the code, or open the address below: the page needs no account and says whether this certificate is valid, superseded or withdrawn.', 'There you can have your own device compare this file’s hash, recompute every figure from the raw data, and verify record and signature.', 'Offline: the record (record.json) and the raw files are attached to this PDF; their hashes stand in the record.']) {
    sheet.paragraph(`• ${line}`, { width, size: 8.4, after: 1 })
  }
  sheet.paragraph(record.checkAddress, { width, size: 7.4, face: 'mono', after: 2 })
  sheet.y = Math.min(sheet.y, top - QR_SIDE) - 4
  for (const [name, value] of [['Record SHA-256', input.recordSha256], [`Signature (Ed25519, key ${input.keyId})`, input.signature], ['Logbook head at issue', `${record.logbook.sequence}: ${record.logbook.entryHash}`]] as const) {
    sheet.need(22)
    sheet.y -= 9
    sheet.text(name, PAGE.left, sheet.y, { size: 7, colour: SOFT })
    sheet.paragraph(value, { size: 7, face: 'mono', after: 1 })
  }
  sheet.y -= 4
  sheet.paragraph('A verdict is about conformity to the buyer’s limits, not about the safety of the product in which the motor is used. Spinning shafts catch fingers, hair and lanyards; strong magnets pinch and affect implants; a motor that is turned generates voltage; hot windings burn. Follow site rules; leave electrical work to qualified people.', { size: 7.4, colour: SOFT })
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

function drawFeet(sheet: Sheet, record: PaperRecord): void {
  const pages = sheet.document.getPages()
  pages.forEach((page, index) => {
    sheet.page = page
    sheet.rule(44)
    sheet.text(`${record.number} · lot ${record.lot.supplierLot} · ${record.decision.outcome}`, PAGE.left, 32, { size: 7.6, colour: SOFT, face: 'mono' })
    sheet.text(`page ${index + 1} of ${pages.length}`, PAGE.right, 32, { size: 7.6, colour: SOFT, align: 'right' })
  })
}

async function attach(sheet: Sheet, input: CertificateInput): Promise<void> {
  const { document } = sheet
  const { record } = input
  const at = new Date(record.issuedAt)
  const dates = { creationDate: at, modificationDate: at }
  await document.attach(new TextEncoder().encode(input.recordText), 'record.json', { mimeType: 'application/json', description: 'The certificate’s record, canonical JSON (RFC 8785)', afRelationship: AFRelationship.Data, ...dates })
  for (const file of input.rawFiles ?? []) {
    await document.attach(file.bytes, file.name, { mimeType: 'text/csv', description: `Raw file, SHA-256 ${file.sha256}`, afRelationship: AFRelationship.Source, ...dates })
  }
  document.setTitle(`Certificate of ${record.kind} ${record.number}`, { showInWindowTitleBar: true })
  document.setAuthor(record.buyer)
  document.setSubject(`Lot ${record.lot.supplierLot}, part ${record.part.number}, ${record.decision.outcome}`)
  document.setLanguage('en')
  document.setProducer('Evenlot')
  document.setCreator('Evenlot')
  document.setCreationDate(at)
  document.setModificationDate(at)
}
