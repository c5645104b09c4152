import { GS } from './control-characters'
import { gs1CheckDigit, hasValidCheckDigit } from './check-digit'
import { gs1Date } from './gs1-date'
import type { GrammarResult, LabelElement, LabelFault, LabelRemark } from './label-reading'

interface Identifier {
  title: string
  /** N: digits, X: the 82 characters of GS1. */
  set: 'N' | 'X'
  shortest: number
  longest: number
  rule?: 'checkDigit' | 'date'
}

const fixed = (title: string, length: number, rule?: Identifier['rule']): Identifier => ({ title, set: 'N', shortest: length, longest: length, rule })
const upTo = (title: string, set: 'N' | 'X', longest: number): Identifier => ({ title, set, shortest: 1, longest })

/** The identifiers that receiving reads; quantities are checked with those of other labels. Source: GS1 Barcode Syntax Dictionary; GS1 General Specifications, 3. */
const IDENTIFIERS: Readonly<Record<string, Identifier>> = {
  '00': fixed('SSCC', 18, 'checkDigit'), '01': fixed('GTIN', 14, 'checkDigit'), '02': fixed('GTIN of the contents', 14, 'checkDigit'),
  '10': upTo('lot number', 'X', 20), '11': fixed('production date', 6, 'date'), '12': fixed('due date', 6, 'date'),
  '13': fixed('packaging date', 6, 'date'), '15': fixed('best-before date', 6, 'date'), '16': fixed('sell-by date', 6, 'date'),
  '17': fixed('expiry date', 6, 'date'), '20': fixed('variant', 2), '21': upTo('serial number', 'X', 20),
  '22': upTo('consumer variant', 'X', 20), '30': upTo('quantity', 'X', 8), '37': upTo('quantity of the contents', 'X', 8),
  '240': upTo('supplier\'s part number', 'X', 30), '241': upTo('customer\'s part number', 'X', 30), '242': upTo('made-to-order number', 'N', 6),
  '250': upTo('second serial number', 'X', 30), '251': upTo('reference to source', 'X', 30), '400': upTo('order number', 'X', 30),
  '401': upTo('consignment number', 'X', 30), '402': fixed('shipment number', 17, 'checkDigit'), '403': upTo('routing code', 'X', 30),
  '410': fixed('ship-to location', 13, 'checkDigit'), '411': fixed('bill-to location', 13, 'checkDigit'),
  '412': fixed('purchased-from location', 13, 'checkDigit'), '413': fixed('ship-for location', 13, 'checkDigit'),
  '414': fixed('physical location', 13, 'checkDigit'), '415': fixed('invoicing location', 13, 'checkDigit'),
  '420': upTo('ship-to postal code', 'X', 20), '421': { title: 'ship-to country and postal code', set: 'X', shortest: 4, longest: 12 },
  '422': fixed('country of origin', 3),
  ...Object.fromEntries(Array.from({ length: 10 }, (_, i) => [`9${i}`, upTo('internal information', 'X', i === 0 ? 30 : 90)])),
}

/** Element strings whose identifier begins so have a length of their own and need no separator: identifier and data together. */
const PREDEFINED_LENGTHS: Readonly<Record<string, number>> = {
  '00': 20, '01': 16, '02': 16, '03': 16, '04': 18, '11': 8, '12': 8, '13': 8, '14': 8, '15': 8, '16': 8, '17': 8, '18': 8, '19': 8,
  '20': 4, '31': 10, '32': 10, '33': 10, '34': 10, '35': 10, '36': 10, '41': 16,
}

/** Digits of identifiers outside the table, by their first two. Source: GS1 General Specifications, 3.2 (from memory). */
function identifierLength(text: string): number {
  for (const length of [2, 3]) if (Object.hasOwn(IDENTIFIERS, text.slice(0, length))) return length
  const start = text.slice(0, 2)
  if (/^(2[3-5]|4[0-2])/.test(start)) return 3
  if (/^(3[1-69]|43|7|8)/.test(start)) return /^71/.test(start) ? 3 : 4
  return 2
}

const SET_82 = /^[!"%-?A-Z_a-z]*$/
const YEAR_FOR_CHECK = 2000

const fault = (code: LabelFault['code'], sentence: string, remedy: string): LabelFault => ({ code, sentence, remedy })
const KEY_IN = 'Check the label, or type the receipt by hand.'

/** One sentence on what is wrong with a value, or null. */
function faultOf({ identifier, value }: LabelElement): LabelFault | null {
  if (value === '') return fault('label.empty-value', `Identifier (${identifier}) has no value.`, KEY_IN)
  const known = IDENTIFIERS[identifier]
  if (!known) return null
  const name = `(${identifier}) ${known.title}`
  if (value.length > known.longest) {
    return fault('label.value-too-long', `${name} may have ${known.longest} characters, but "${value}" has ${value.length}.`, 'Check that the scanner sends the separator GS (FNC1) between fields.')
  }
  if (value.length < known.shortest) return fault('label.value-format', `${name} needs ${known.shortest} characters, but "${value}" has ${value.length}.`, KEY_IN)
  if (known.set === 'N' && !/^\d+$/.test(value)) return fault('label.value-format', `${name} must be digits, but reads "${value}".`, KEY_IN)
  if (!SET_82.test(value)) return fault('label.value-format', `${name} holds a character that GS1 labels do not allow: "${value}".`, KEY_IN)
  if (known.rule === 'checkDigit' && !hasValidCheckDigit(value)) {
    return fault('label.check-digit', `The check digit of ${name} is ${value.at(-1)}, but the digits before it give ${gs1CheckDigit(value.slice(0, -1))}.`, 'Scan again; if it stays, the label is wrong: type the receipt by hand and tell the supplier.')
  }
  if (known.rule === 'date' && gs1Date(value, YEAR_FOR_CHECK) === null) return fault('label.date', `${name} is no date: "${value}" (year, month, day).`, KEY_IN)
  return null
}

/** Cuts a text of element strings; a GS ends a value early in any case. */
function cut(text: string): { elements: LabelElement[]; faults: LabelFault[] } {
  const elements: LabelElement[] = []
  let rest = text
  while (rest !== '') {
    if (rest.startsWith(GS)) {
      rest = rest.slice(1)
      continue
    }
    const identifier = rest.slice(0, identifierLength(rest))
    if (!/^\d{2,4}$/.test(identifier)) {
      const shown = rest.split(GS)[0]!
      return { elements, faults: [fault('label.identifier', `"${shown}" does not begin with a GS1 identifier.`, 'Check that the scanner sends the separator GS (FNC1) between fields.')] }
    }
    const separator = rest.indexOf(GS)
    const field = separator < 0 ? rest.length : separator
    const end = Math.min(field, PREDEFINED_LENGTHS[rest.slice(0, 2)] ?? field)
    elements.push({ identifier, value: rest.slice(identifier.length, end) })
    rest = rest.slice(end)
  }
  return { elements, faults: [] }
}

/** Cuts the bracketed form that people read and type: (01)…(10)…. */
function cutBrackets(text: string): { elements: LabelElement[]; faults: LabelFault[] } {
  if (!/^(\(\d{2,4}\)[^(]*)+$/.test(text)) {
    return { elements: [], faults: [fault('label.identifier', 'The brackets do not each hold a GS1 identifier of two to four digits.', KEY_IN)] }
  }
  const elements = [...text.matchAll(/\((\d{2,4})\)([^(]*)/g)].map(match => ({ identifier: match[1]!, value: match[2]!.trim() }))
  return { elements, faults: [] }
}

function repeated(elements: readonly LabelElement[]): LabelFault[] {
  const seen = new Map<string, string>()
  const faults: LabelFault[] = []
  for (const { identifier, value } of elements) {
    const first = seen.get(identifier)
    if (first !== undefined && first !== value) {
      faults.push(fault('label.repeated', `Identifier (${identifier}) stands twice, with "${first}" and "${value}".`, 'Scan one label at a time.'))
    }
    seen.set(identifier, value)
  }
  return faults
}

function missingPartners(elements: readonly LabelElement[]): LabelRemark[] {
  const has = (identifier: string): boolean => elements.some(each => each.identifier === identifier)
  const missing = has('02') ? ['37', '00'].filter(each => !has(each)) : has('37') && !has('02') ? ['02'] : []
  const owner = has('02') ? '02' : '37'
  return missing.map(each => ({ code: 'label.pair-required', sentence: `(${owner}) should come with (${each}), which is not on this label.` }))
}

/**
 * Reads GS1 element strings, plain (FNC1 as GS) or in brackets.
 *
 * @param text without symbology prefix; a leading GS is allowed
 * @returns elements in label order, faults and remarks; unknown identifiers are kept up to the next separator
 * Source: GS1 General Specifications, 3 and 7.8; GS1 Barcode Syntax Dictionary.
 */
export function parseGs1(text: string): GrammarResult {
  const { elements, faults } = text.startsWith('(') ? cutBrackets(text) : cut(text)
  const valueFaults = elements.map(faultOf).filter(each => each !== null)
  return { elements, faults: [...valueFaults, ...repeated(elements), ...faults], remarks: missingPartners(elements) }
}
