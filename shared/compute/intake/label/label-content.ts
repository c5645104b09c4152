import type { LabelContent, LabelElement, LabelFault } from './label-reading'

type Field = Exclude<keyof LabelContent, 'quantity'>

/** Identifiers of each field, the one to be preferred first. Data identifiers from memory of ANSI MH10.8.2. */
const FIELDS: Readonly<Record<Field, readonly string[]>> = {
  part: ['P', '241'],
  supplierPart: ['1P', '30P', '240'],
  revision: ['2P'],
  lot: ['1T', 'T', '10'],
  serial: ['S', '21'],
  supplier: ['V', '1V', '12V'],
  orderNumber: ['K', '14K', '400'],
  gtin: ['01', '02'],
  packageNumber: ['3S', '1J', '3J', '5J', '6J', '00'],
}
const QUANTITIES = ['Q', '7Q', '30', '37']

/** Known identifiers that receiving does not need; they are not "unknown". */
const OTHERS = new Set([
  '1K', '2K', '4K', '11K', 'D', '6D', '9D', '10D', '14D', '16D', '4L', '13Q',
  '11', '12', '13', '15', '16', '17', '20', '22', '242', '250', '251', '401', '402', '403', '410', '411', '412', '413', '414', '415', '420', '421', '422',
])
const READ = new Set([...Object.values(FIELDS).flat(), ...QUANTITIES, ...OTHERS])

/** Unit codes of 7Q that count pieces (from memory: PC and PCE piece, EA each). */
const PIECES = /^(PC|PCE|EA)$/
/** Common practice, no source. */
const MOST_DIGITS = 8

/** A quantity in words: pieces, null when it counts something else, or the fault. */
function readQuantity({ identifier, value }: LabelElement): number | null | LabelFault {
  const unitMatch = identifier === '7Q' ? /^([^A-Z]*)([A-Z].*)$/.exec(value) : null
  if (unitMatch && !PIECES.test(unitMatch[2]!)) return null
  const digits = (unitMatch ? unitMatch[1]! : value).trim()
  const problem = !/^\d+$/.test(digits) ? 'is not a whole number of motors'
    : digits.replace(/^0+/, '').length > MOST_DIGITS ? `has more than ${MOST_DIGITS} digits`
      : Number(digits) === 0 ? 'is 0' : null
  if (problem === null) return Number(digits)
  return { code: 'label.quantity', sentence: `The quantity on the label ("${value}", identifier ${identifier}) ${problem}.`, remedy: 'Count the motors and type the quantity by hand.' }
}

/**
 * What receiving needs from the elements of a label.
 *
 * @param elements in label order
 * @returns the fields found, elements with unknown identifiers, and faults of the quantity
 */
export function contentOf(elements: readonly LabelElement[]): { content: LabelContent; unknown: LabelElement[]; faults: LabelFault[] } {
  const content: LabelContent = {}
  const faults: LabelFault[] = []
  const find = (identifiers: readonly string[]): LabelElement | undefined =>
    identifiers.map(identifier => elements.find(each => each.identifier === identifier && each.value !== '')).find(Boolean)
  for (const [field, identifiers] of Object.entries(FIELDS) as [Field, readonly string[]][]) {
    const element = find(identifiers)
    if (element) content[field] = element.identifier === '14K' ? element.value.split('+')[0] : element.value.trim()
  }
  const unknown = elements.filter(each => !READ.has(each.identifier))
  for (const element of elements.filter(each => QUANTITIES.includes(each.identifier) && each.value !== '')) {
    const quantity = readQuantity(element)
    if (quantity === null) unknown.push(element)
    else if (typeof quantity === 'number') content.quantity ??= quantity
    else faults.push(quantity)
  }
  return { content, unknown, faults }
}
