import { EOT, GS, restoreControlCharacters, RS } from './control-characters'
import { parseGs1 } from './gs1'
import { faultsOfFields, parseEnvelope, splitDataIdentifier } from './iso15434'
import { contentOf } from './label-content'
import type { GrammarResult, LabelKind, LabelReading } from './label-reading'

/** Longest text taken for one label; the largest two-dimensional codes hold about 3 000 characters. */
const LONGEST_LABEL = 4096

/** Symbology prefixes that announce GS1 data: Code 128, Data Matrix, QR, DataBar. Others are cut off. */
const GS1_PREFIX = /^\](C1|d2|Q3|e0)/
const OTHER_PREFIX = /^\][A-Za-z]\d/
const SEPARATORS = [GS, RS, EOT]
/** A quantity, perhaps faulty, as opposed to a serial that begins with Q. */
const QUANTITY_LIKE = /^\d+([.,]\d+)?\s?([A-Z]{2,3})?$/

/** An unannounced text is GS1 when it is in brackets, holds GS, or begins with a GTIN or SSCC. */
function looksLikeGs1(text: string): boolean {
  return /^\(\d{2,4}\)/.test(text) || (text.includes(GS) && /^\d{2}/.test(text.startsWith(GS) ? text.slice(1) : text)) || /^(00\d{18}|0[12]\d{14})/.test(text)
}

/** One identifier a code, as on linear labels; what has no known identifier is just text. */
function parsePlain(text: string): GrammarResult {
  const element = splitDataIdentifier(text)
  const byChance = element === null || element.value === ''
    || (/Q$/.test(element.identifier) && !QUANTITY_LIKE.test(element.value))
  return !byChance && contentOf([element]).unknown.length === 0 ? { elements: [element], faults: faultsOfFields([element]), remarks: [] } : { elements: [], faults: [], remarks: [] }
}

function wrongEnvelope(): GrammarResult {
  const fault = {
    code: 'label.envelope' as const, sentence: 'The label has separators, but does not begin with the header "[)>" and RS.',
    remedy: 'Check the keyboard layout that the scanner is set to, and scan again.',
  }
  return { elements: [], faults: [fault], remarks: [] }
}

function grammarOf(text: string): { kind: LabelKind; result: GrammarResult } {
  if (GS1_PREFIX.test(text)) return { kind: 'gs1', result: parseGs1(text.slice(3)) }
  const bare = text.replace(OTHER_PREFIX, '')
  if (bare.startsWith('[)>')) return { kind: 'iso15434', result: parseEnvelope(bare) }
  if (looksLikeGs1(bare)) return { kind: 'gs1', result: parseGs1(bare) }
  if (SEPARATORS.some(each => bare.includes(each)) || bare.startsWith('[)')) return { kind: 'iso15434', result: wrongEnvelope() }
  return { kind: 'plain', result: parsePlain(bare) }
}

function refused(text: string, code: 'label.empty' | 'label.too-long', sentence: string): LabelReading {
  return { ok: false, kind: 'plain', text, elements: [], faults: [{ code, sentence, remedy: 'Scan the label again.' }] }
}

/**
 * Reads a scanned label: an ISO/IEC 15434 envelope (format 06 with data identifiers, format 05 with GS1), GS1 element
 * strings (prefix ]C1, ]d2, ]Q3 or ]e0, FNC1 as GS, or in brackets), or a plain code with or without one data identifier.
 *
 * Scanners that cannot type control characters may send `<GS>`, `{GS}`, `[GS]`, `^]`, `␝` or `\x1D` and the like instead.
 * Unknown identifiers are kept. A plain code that begins with an identifier by chance ("T77") is both: its `text` is
 * the whole code and its fields hold the reading by identifier.
 *
 * @param text as the scanner typed it; line ends are dropped
 * @returns what the label says, or its faults, each with one sentence and a remedy, beside the elements read so far
 * Source: ISO/IEC 15434; ANSI MH10.8.2 (identifiers from memory); GS1 General Specifications.
 */
export function parseLabel(text: string): LabelReading {
  const scanned = text.trim()
  if ([...scanned].every(each => SEPARATORS.includes(each))) return refused(scanned, 'label.empty', 'The scan is empty.')
  if (scanned.length > LONGEST_LABEL) {
    return refused(scanned.slice(0, LONGEST_LABEL), 'label.too-long', `The scan has ${scanned.length} characters; a label has at most ${LONGEST_LABEL}.`)
  }
  const restored = restoreControlCharacters(scanned)
  const { kind, result } = grammarOf(restored.text)
  const { content, unknown, faults } = contentOf(result.elements)
  const allFaults = [...result.faults, ...faults]
  if (allFaults.length > 0) return { ok: false, kind, text: scanned, elements: result.elements, faults: allFaults }
  const remarks = [...result.remarks]
  if (restored.substituted) remarks.unshift({ code: 'label.separator-substituted', sentence: 'The scanner sent visible signs in place of control characters; they were read as such.' })
  for (const element of unknown) {
    const name = element.identifier === '' ? `"${element.value}" has no identifier` : `Identifier ${element.identifier} ("${element.value}") is not known here`
    remarks.push({ code: 'label.identifier-unknown', sentence: `${name}; it is kept with the receipt.` })
  }
  return { ok: true, kind, text: scanned, ...content, elements: result.elements, unknown, remarks }
}
