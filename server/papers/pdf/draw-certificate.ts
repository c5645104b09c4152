import { partRemarks } from '#shared/compute/judging/notes'
import { describeRule } from '#shared/compute/judging/rule'
import type { PaperRecord } from '#shared/contracts/paper-record'
import { attachFiles } from './attachments'
import type { RawFile } from './attachments'
import { drawRosette, drawWorst, failing, nameOf, worstMotor } from './figures'
import type { PaperFonts } from './fonts'
import { drawHead, facts } from './head'
import { drawResults } from './results'
import { FAIL, INK, PAGE, Sheet, SOFT } from './sheet'
import { drawSignature } from './signature'
import { drawFacts, drawLimits } from './tables'
import { dateText, timeFormat } from './times'
import type { TimeFormat } from './times'

export interface CertificateInput {
  record: PaperRecord
  /** The record's canonical JSON, attached byte for byte. */
  recordText: string
  recordSha256: string
  /** Ed25519, base64. */
  signature: string
  keyId: string
  fonts: PaperFonts
  /** Raw files to attach; null: too large together, the record names them by their hashes. */
  rawFiles: RawFile[] | null
}

const METHODS = { 'torque-sensor': 'torque sensor, slow sweep', 'hold': 'hold position', 'spin': 'slow spin' } as const

/** Draws a certificate from its record, and from nothing else: the same record gives the same bytes. */
export async function drawCertificate(input: CertificateInput): Promise<Uint8Array> {
  const { record } = input
  const sheet = await Sheet.create(input.fonts)
  const time = timeFormat(record.timeZone)
  drawHead(sheet, record, time)
  drawFacts(sheet, facts(record, time))
  drawPlan(sheet, record)
  drawLargest(sheet, record)
  sheet.heading(`Limit sheet ${record.sheet.version}`, 84)
  sheet.paragraph(`Written by ${record.sheet.author}, approved by ${record.sheet.approvedBy}${record.sheet.approvedAt ? ` on ${time(record.sheet.approvedAt)}` : ''}. ${describeRule(record.sheet.content.decisionRule)}`, { colour: SOFT, after: 2 })
  drawLimits(sheet, record)
  drawMeasurement(sheet, record, time)
  drawResults(sheet, record)
  drawRosette(sheet, record)
  drawSignature(sheet, record, { ...input, rawFilesAttached: input.rawFiles !== null }, time)
  drawFeet(sheet, record)
  await attachFiles(sheet.document, input.recordText, input.rawFiles ?? [], new Date(record.issuedAt))
  describe(sheet, record)
  return sheet.document.save({ useObjectStreams: false, addDefaultPage: false })
}

function drawPlan(sheet: Sheet, record: PaperRecord): void {
  sheet.heading('Sampling plan', 64)
  sheet.paragraph(record.plan.sentence, { size: 10.5, face: 'bold', after: 2 })
  sheet.paragraph(`${record.severityReason} ${record.lotVerdict.sentence}`, { colour: SOFT })
  if (record.decision.overruled) sheet.paragraph(`Rejected against the computed acceptance: ${record.decision.reason}`, { face: 'bold', colour: FAIL })
  if (!record.lotVerdict.complete) sheet.paragraph('The lot was decided before all drawn motors were measured; the sample is incomplete.', { face: 'bold' })
  if (record.explanation.length === 0) return
  sheet.heading('Likely origin')
  for (const sentence of record.explanation) sheet.paragraph(sentence, { after: 2 })
  sheet.y -= 3
}

function drawLargest(sheet: Sheet, record: PaperRecord): void {
  const worst = worstMotor(record)
  if (!worst) return
  sheet.heading(`Motor ${nameOf(worst)}: ${failing(worst) ? 'the worst of those that fail' : 'nearest to a limit'}`, 216)
  drawWorst(sheet, record, worst)
}

function drawMeasurement(sheet: Sheet, record: PaperRecord, time: TimeFormat): void {
  sheet.heading('Measurement', 96)
  if (record.rigs.length === 0) sheet.paragraph('No motor was measured.')
  for (const { code, name, method, calibration } of record.rigs) {
    drawFacts(sheet, [
      ['Rig', `${code}, ${name}`], ['Method', METHODS[method]], ['Uncertainty', `standard, of torque: ${Number((100 * calibration.torqueRelativeUncertainty).toPrecision(3))} % and ${Number((1e6 * calibration.torqueAbsoluteUncertaintyNm).toPrecision(3))} μN·m`],
      ['Calibration', calibration.certificateNumber || 'not stated', 'mono'], ['Laboratory', calibration.laboratory || 'not stated'], ['Calibrated', `${dateText(calibration.performedOn)}, due ${dateText(calibration.dueOn)}`],
    ])
    sheet.y -= 3
  }
  const distinct = (pick: (sample: PaperRecord['samples'][number]) => string | null) => [...new Set(record.samples.flatMap(sample => pick(sample) ?? []))].sort()
  const times = distinct(sample => sample.measuredAt)
  const measured = times.length === 0 ? '' : `Measured by ${distinct(sample => sample.measuredBy).join(', ') || 'not stated'}, ${[...new Set([time(times[0]!), time(times.at(-1)!)])].join(' to ')}. `
  const notes = [...new Set(record.samples.flatMap(sample => partRemarks(sample.warnings).notes.map(note => note.sentence)))].map(note => `${note} `).join('')
  sheet.paragraph(`${measured}${notes}Evaluation version ${distinct(sample => sample.engineVersion).join(', ') || 'not stated'}. Times are in ${record.timeZone}.`, { size: 7.8, colour: SOFT, after: 1 })
  sheet.paragraph(`Sample drawn with seed ${record.draw.seed} by ${record.draw.generator}.`, { size: 7.8, colour: SOFT })
}

function drawFeet(sheet: Sheet, record: PaperRecord): void {
  const pages = sheet.document.getPages()
  pages.forEach((page, index) => {
    sheet.page = page
    sheet.rule(44)
    sheet.text(record.number, PAGE.left, 32, { size: 7.6, face: 'monoBold', colour: INK })
    const [lot] = sheet.wrap(`lot ${record.lot.supplierLot}, ${record.decision.outcome}`, 330, { size: 7.6 })
    sheet.text(lot!, PAGE.left + 76, 32, { size: 7.6, colour: SOFT })
    sheet.text(`page ${index + 1} of ${pages.length}`, PAGE.right, 32, { size: 7.6, colour: SOFT, align: 'right' })
  })
}

function describe(sheet: Sheet, record: PaperRecord): void {
  const { document } = sheet
  const at = new Date(record.issuedAt)
  document.setTitle(`Certificate of ${record.kind} ${record.number}`, { showInWindowTitleBar: true })
  document.setAuthor(record.buyer)
  document.setSubject(`Lot ${record.lot.supplierLot}, part ${record.part.number}, ${record.decision.outcome}`)
  document.setLanguage('en')
  document.setProducer('Evenlot')
  document.setCreator('Evenlot')
  document.setCreationDate(at)
  document.setModificationDate(at)
}
