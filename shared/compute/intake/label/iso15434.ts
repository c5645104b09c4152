import { EOT, GS, RS, showControlCharacters } from './control-characters'
import { parseGs1 } from './gs1'
import type { GrammarResult, LabelElement, LabelFault, LabelRemark } from './label-reading'

/** Longest value taken; common practice, no source (MH10.8.2 leaves most fields to the partners). */
const LONGEST_VALUE = 50
const TYPE_BY_HAND = 'Check the label, or type the receipt by hand.'
const SET_SCANNER = 'Set the scanner to send the control characters GS, RS and EOT, and scan again.'

/** Splits a field into data identifier (up to three digits and a letter) and value; null when it has none. */
export function splitDataIdentifier(field: string): LabelElement | null {
  const match = /^(\d{0,3}[A-Z])([^]*)$/.exec(field)
  return match ? { identifier: match[1]!, value: match[2]! } : null
}

/** Faults of one field's value and of a second value under the same identifier. */
export function faultsOfFields(elements: readonly LabelElement[]): LabelFault[] {
  const faults: LabelFault[] = []
  const seen = new Map<string, string>()
  for (const { identifier, value } of elements) {
    if (identifier === '') continue
    const first = seen.get(identifier)
    if (value === '') faults.push({ code: 'label.empty-value', sentence: `Identifier ${identifier} has no value.`, remedy: TYPE_BY_HAND })
    if (value.length > LONGEST_VALUE) {
      faults.push({ code: 'label.value-too-long', sentence: `The value of ${identifier} has ${value.length} characters; at most ${LONGEST_VALUE} are read.`, remedy: SET_SCANNER })
    }
    if (first !== undefined && first !== value) {
      faults.push({ code: 'label.repeated', sentence: `Identifier ${identifier} stands twice, with "${first}" and "${value}".`, remedy: 'Scan one label at a time.' })
    }
    seen.set(identifier, value)
  }
  return faults
}

/** Format 06: fields with data identifiers; format 05: GS1 element strings. */
function parseFormat(format: string, body: string): GrammarResult {
  if (format === '05') return parseGs1(body)
  const remarks: LabelRemark[] = []
  const fields = body.split(GS)
  if (fields.some(field => field === '')) remarks.push({ code: 'label.field-empty', sentence: 'An empty field between two separators was left out.' })
  const elements = fields.filter(field => field !== '').map(field => splitDataIdentifier(field) ?? { identifier: '', value: field })
  return { elements, faults: faultsOfFields(elements), remarks }
}

const refuse = (code: LabelFault['code'], sentence: string, remedy: string): GrammarResult => ({ elements: [], faults: [{ code, sentence, remedy }], remarks: [] })

function segment(text: string): GrammarResult {
  const format = text.slice(0, 2)
  if (!/^\d\d$/.test(format)) return refuse('label.envelope', `The envelope does not name its format: "${showControlCharacters(text.slice(0, 12))}".`, TYPE_BY_HAND)
  if (format !== '05' && format !== '06') return refuse('label.format', `Format ${format} of the envelope is not read here, only 05 (GS1) and 06 (data identifiers).`, 'Type the receipt by hand, or ask the supplier for a format 06 label.')
  if (text.length === 2) return refuse('label.unfinished', 'The label ends after its format; nothing else was scanned.', 'Scan the label again.')
  if (text[2] !== GS) return refuse('label.separators-missing', `The separator GS is missing after format ${format}, so the fields cannot be told apart.`, SET_SCANNER)
  return parseFormat(format, text.slice(3))
}

function trailerRemark(hasRecordEnd: boolean, hasMessageEnd: boolean): LabelRemark[] {
  if (hasRecordEnd && hasMessageEnd) return []
  const missing = !hasRecordEnd && !hasMessageEnd ? 'RS and EOT are' : hasMessageEnd ? 'RS is' : 'EOT is'
  return [{ code: 'label.trailer-missing', sentence: `${missing} missing at the end of the label; the last field may be incomplete.` }]
}

/**
 * Reads an ISO/IEC 15434 message: `[)>` RS, then one or more formats, each ended by RS, and EOT.
 *
 * Missing RS after the header and missing RS or EOT at the end are tolerated with a remark, as such labels are in use; a
 * missing GS is not, because the fields could not be told apart.
 *
 * @param text beginning with `[)>`, control characters restored
 * @returns elements in label order (identifier '' for a field without one), faults and remarks
 * Source: ISO/IEC 15434; ANSI MH10.8.2 / ISO/IEC 15418 (identifiers from memory).
 */
export function parseEnvelope(text: string): GrammarResult {
  let body = text.slice(3)
  const remarks: LabelRemark[] = []
  if (body.startsWith(RS)) body = body.slice(1)
  else if (body !== '') remarks.push({ code: 'label.record-separator-missing', sentence: 'RS is missing after the header; the label was read all the same.' })
  const hasMessageEnd = body.endsWith(EOT)
  if (hasMessageEnd) body = body.slice(0, -1)
  const hasRecordEnd = body.endsWith(RS)
  if (hasRecordEnd) body = body.slice(0, -1)
  if (body === '') return refuse('label.unfinished', 'The label ends after its header; nothing else was scanned.', 'Scan the label again.')
  if (body.includes(EOT)) return refuse('label.envelope', 'The label goes on after its end mark EOT.', 'Scan one label at a time.')
  const parts = body.split(RS).map(segment)
  return {
    elements: parts.flatMap(part => part.elements),
    faults: parts.flatMap(part => part.faults),
    remarks: [...remarks, ...parts.flatMap(part => part.remarks), ...trailerRemark(hasRecordEnd, hasMessageEnd)],
  }
}
