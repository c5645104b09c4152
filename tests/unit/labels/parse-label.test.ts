import { describe, expect, it } from 'vitest'
import { gs1CheckDigit, hasValidCheckDigit } from '#shared/compute/intake/label/check-digit'
import { gs1Date, gs1Year } from '#shared/compute/intake/label/gs1-date'
import { parseLabel } from '#shared/compute/intake/label/parse-label'
import type { LabelReading } from '#shared/compute/intake/label/label-reading'
// Each case in the file carries its source.
import reference from '../../reference/labels.json'

interface Case { id: string; inputs: Record<string, unknown>; expected: Record<string, unknown> }
const cases = reference.cases as unknown as Case[]
const startingWith = (prefix: string) => cases.filter(each => each.id.startsWith(prefix))
const pairs = (reading: LabelReading) => reading.elements.map(each => [each.identifier, each.value])
const codes = (reading: LabelReading) => reading.ok ? [] : reading.faults.map(each => each.code)
const remarks = (reading: LabelReading) => reading.ok ? reading.remarks.map(each => each.code) : []
const read = (reading: LabelReading) => {
  if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
  return reading
}

const GOOD = '[)>\u001E06\u001DP4711-A\u001D1PMX-22-24V\u001DQ240\u001D1TL240611\u001DVSUP01\u001DKPO-778\u001D4LDE\u001E\u0004'

describe('check digits', () => {
  it.each(startingWith('cd-'))('agree with the published key $inputs.key', ({ inputs, expected }) => {
    const key = inputs.key as string
    expect(hasValidCheckDigit(key)).toBe(expected.valid)
    expect(gs1CheckDigit(key.slice(0, -1))).toBe(expected.check_digit ?? expected.correct_check_digit)
  })

  it.each(['', '12a'])('refuses "%s"', (text) => {
    expect(() => gs1CheckDigit(text)).toThrow(RangeError)
  })
})

describe('GS1 dates', () => {
  // Source: GS1 General Specifications, 7.12 (from memory).
  const rule = cases.find(each => each.id === 'century-rule')!
  it('take the century by the rule', () => {
    expect((rule.inputs.yy as number[]).map(yy => gs1Year(yy, rule.inputs.current_year as number))).toEqual(rule.expected.year)
  })

  it.each([['251231', '2025-12-31'], ['250200', '2025-02-28'], ['240200', '2024-02-29'], ['250229', null], ['251301', null], ['250001', null], ['25123', null]])(
    'read %s as %s', (text, date) => {
      expect(gs1Date(text, 2025)).toBe(date)
    })
})

describe('parseLabel on published cases', () => {
  it.each(startingWith('gs1-'))('reads GS1 case $id', ({ id, inputs, expected }) => {
    const reading = parseLabel(inputs.raw as string)
    expect(reading.kind).toBe('gs1')
    if (id === 'gs1-11') return expect(remarks(reading)).toContain('label.pair-required')
    expect(reading.ok).toBe(expected.ok)
    if (expected.ok) expect(pairs(reading)).toEqual(expected.elements)
    else expect(codes(reading)).toEqual(['label.check-digit'])
  })

  it.each(startingWith('tv-'))('reads GS1 vector $id, in brackets and as encoded', ({ inputs, expected }) => {
    const bracketed = parseLabel(inputs.bracketed as string)
    expect(bracketed.ok).toBe(expected.ok)
    if (expected.ok) expect(pairs(parseLabel(expected.encoded as string))).toEqual(pairs(bracketed))
  })

  it.each(startingWith('env-').filter(each => each.expected.fields))('reads envelope $id', ({ inputs, expected }) => {
    const reading = read(parseLabel(inputs.raw as string))
    expect(reading.kind).toBe('iso15434')
    expect(pairs(reading)).toEqual(expected.fields)
    const odd = reading.remarks.map(each => each.code).filter(each => each !== 'label.identifier-unknown')
    expect(odd).toEqual(expected.tolerated ? ['label.record-separator-missing', 'label.trailer-missing'] : [])
  })

  it('reads one data identifier on a linear code, env-7', () => {
    expect(pairs(parseLabel('P4711-A'))).toEqual([['P', '4711-A']])
  })

  it.each(reference.identifiers.data.list)('knows data identifier $di: $meaning (from memory)', ({ di }) => {
    expect(read(parseLabel(`[)>\u001E06\u001D${di}12\u001E\u0004`)).unknown).toEqual([])
  })

  it.each(reference.identifiers.gs1.list)('knows GS1 identifier $ai and its length: $format', ({ ai, format }) => {
    const digits = Number(/\d+$|\d+(?= )/.exec(format.replace(/^[NX]/, ''))![0])
    const ofLength = (length: number) => {
      const keyed = format.includes('check digit') || ai.startsWith('41')
      if (/YYMMDD|^N6$/.test(format)) return '251231'.padEnd(length, '1').slice(0, length)
      return keyed ? `${'1'.repeat(length - 1)}${gs1CheckDigit('1'.repeat(length - 1))}` : '1'.repeat(length)
    }
    expect(read(parseLabel(`]C1${ai}${ofLength(digits)}`)).unknown).toEqual([])
    expect(parseLabel(`(${ai})${ofLength(digits + 1)}`).ok).toBe(false)
  })
})

describe('parseLabel on a format 06 label', () => {
  it('fills the receipt', () => {
    expect(read(parseLabel(GOOD))).toMatchObject({
      kind: 'iso15434', part: '4711-A', supplierPart: 'MX-22-24V', quantity: 240, lot: 'L240611', supplier: 'SUP01', orderNumber: 'PO-778', unknown: [], remarks: [],
    })
  })

  it.each([
    ['<GS>', '<RS>', '<EOT>'], ['{GS}', '{RS}', '{EOT}'], ['[GS]', '[RS]', '[EOT]'], ['^]', '^^', '^D'], ['\u241D', '\u241E', '\u2404'], ['\\x1D', '\\x1E', '\\x04'],
  ])('reads the visible substitutes %s %s %s', (gs, rs, eot) => {
    const reading = read(parseLabel(GOOD.replaceAll('\u001D', gs).replaceAll('\u001E', rs).replaceAll('\u0004', eot)))
    expect(pairs(reading)).toEqual(pairs(parseLabel(GOOD)))
    expect(remarks(reading)).toEqual(['label.separator-substituted'])
  })

  it.each([
    ['a line end of the scanner', `${GOOD}\r\n`], ['a symbology prefix', `]d1${GOOD}`], ['leading blanks', `  ${GOOD}`],
  ])('is not disturbed by %s', (_, text) => {
    expect(pairs(parseLabel(text))).toEqual(pairs(parseLabel(GOOD)))
  })

  it.each([
    ['RS missing after the header', GOOD.replace('\u001E', ''), 'label.record-separator-missing'],
    ['EOT missing', GOOD.slice(0, -1), 'label.trailer-missing'],
    ['RS missing at the end', `${GOOD.slice(0, -2)}\u0004`, 'label.trailer-missing'],
    ['an empty field', GOOD.replace('\u001DQ', '\u001D\u001DQ'), 'label.field-empty'],
    ['an unknown identifier', GOOD.replace('4LDE', '99ZXY'), 'label.identifier-unknown'],
    ['a field without identifier', GOOD.replace('4LDE', '-xy'), 'label.identifier-unknown'],
  ])('is read with a remark on %s', (_, text, code) => {
    const reading = read(parseLabel(text))
    expect(remarks(reading)).toEqual([code])
    expect(reading).toMatchObject({ part: '4711-A', quantity: 240 })
  })

  it('keeps unknown identifiers', () => {
    expect(read(parseLabel(GOOD.replace('4LDE', '99ZXY'))).unknown).toEqual([{ identifier: '99Z', value: 'XY' }])
  })

  it.each([
    ['no separators at all', '[)>06P4711-A1PMX', 'label.separators-missing'],
    ['another format', GOOD.replace('06\u001D', '12\u001D'), 'label.format'],
    ['no format', GOOD.replace('06\u001D', ''), 'label.envelope'],
    ['another header', GOOD.replace('[)>', '[>)'), 'label.envelope'],
    ['a header cut off', GOOD.slice(3), 'label.envelope'],
    ['nothing after the header', '[)>\u001E', 'label.unfinished'],
    ['nothing after the format', '[)>\u001E06', 'label.unfinished'],
    ['two labels in one scan', GOOD + GOOD, 'label.envelope'],
    ['an identifier without value', GOOD.replace('P4711-A', 'P'), 'label.empty-value'],
    ['an identifier twice with different values', GOOD.replace('4LDE', 'P4712'), 'label.repeated'],
    ['a quantity of 0', GOOD.replace('Q240', 'Q0'), 'label.quantity'],
    ['a quantity of 000', GOOD.replace('Q240', 'Q000'), 'label.quantity'],
    ['a broken quantity', GOOD.replace('Q240', 'Q2.5'), 'label.quantity'],
    ['a negative quantity', GOOD.replace('Q240', 'Q-2'), 'label.quantity'],
    ['a quantity in words', GOOD.replace('Q240', 'Qten'), 'label.quantity'],
    ['a quantity of nine digits', GOOD.replace('Q240', 'Q123456789'), 'label.quantity'],
    ['a value of 51 characters', GOOD.replace('4711-A', 'A'.repeat(51)), 'label.value-too-long'],
  ])('is refused for %s with one sentence', (_, text, code) => {
    const reading = parseLabel(text)
    expect(codes(reading)).toEqual([code])
    if (!reading.ok) expect(reading.faults[0]).toMatchObject({ sentence: expect.stringMatching(/^[A-Z(].*\.$/), remedy: expect.stringMatching(/\.$/) })
    expect(reading.text).toBe(text)
  })

  it('accepts a value of 50 characters, a quantity of one and one of eight digits', () => {
    expect(read(parseLabel(GOOD.replace('4711-A', 'A'.repeat(50)))).part).toHaveLength(50)
    expect(read(parseLabel(GOOD.replace('Q240', 'Q1'))).quantity).toBe(1)
    expect(read(parseLabel(GOOD.replace('Q240', 'Q12345678'))).quantity).toBe(12_345_678)
  })

  it('keeps the elements of a label that it refuses', () => {
    expect(pairs(parseLabel(GOOD.replace('Q240', 'Q0')))).toContainEqual(['P', '4711-A'])
  })

  it('takes an identifier that stands twice with the same value', () => {
    expect(read(parseLabel(GOOD.replace('4LDE', 'P4711-A'))).part).toBe('4711-A')
  })

  it.each([['7Q240PC', 240, []], ['7Q240EA', 240, []], ['7Q1.5KG', undefined, ['7Q']]])('reads %s as %s pieces', (field, quantity, unknown) => {
    const reading = read(parseLabel(`[)>\u001E06\u001D${field}\u001E\u0004`))
    expect(reading.quantity).toBe(quantity)
    expect(reading.unknown.map(each => each.identifier)).toEqual(unknown)
  })

  it('prefers the supplier\'s lot number over the customer\'s', () => {
    expect(read(parseLabel('[)>\u001E06\u001DT77\u001D1TL5\u001E\u0004')).lot).toBe('L5')
  })

  it('takes the order out of order and line', () => {
    expect(read(parseLabel('[)>\u001E06\u001D14KPO1+10\u001E\u0004')).orderNumber).toBe('PO1')
  })

  it('reads several formats in one envelope', () => {
    const reading = read(parseLabel('[)>\u001E06\u001DP4711\u001E05\u001D10AB1\u001D3724\u001E\u0004'))
    expect(reading).toMatchObject({ part: '4711', lot: 'AB1', quantity: 24 })
  })
})

describe('parseLabel on a GS1 label', () => {
  const ELEMENTS = '010952123454321310ABC123\u001D37240'

  it.each([']C1', ']d2', ']Q3', ']e0', '\u001D', ']d2\u001D'])('reads it behind the prefix "%s"', (prefix) => {
    expect(read(parseLabel(prefix + ELEMENTS))).toMatchObject({ kind: 'gs1', gtin: '09521234543213', lot: 'ABC123', quantity: 240 })
  })

  it.each(['<GS>', '{GS}', '^]', '\u241D', '<FNC1>'])('reads %s as separator', (substitute) => {
    expect(read(parseLabel(ELEMENTS.replace('\u001D', substitute)))).toMatchObject({ lot: 'ABC123', quantity: 240 })
  })

  it('reads part, supplier\'s part, serial and order', () => {
    expect(read(parseLabel('(241)KF-100(240)MX-22(21)71-4452(400)PO-9'))).toMatchObject({ part: 'KF-100', supplierPart: 'MX-22', serial: '71-4452', orderNumber: 'PO-9' })
  })

  it('keeps an unknown identifier up to the next separator', () => {
    const reading = read(parseLabel(']C13101000123\u001D10L1'))
    expect(reading.unknown).toEqual([{ identifier: '3101', value: '000123' }])
    expect(reading.lot).toBe('L1')
  })

  it.each([
    ['a wrong check digit of an SSCC', '00123456789012345676', ['label.check-digit']],
    ['a short GTIN', ']C1010952123', ['label.value-format']],
    ['letters in a GTIN', '(01)0952123454321X', ['label.value-format']],
    ['a lot of 21 characters', `(10)${'A'.repeat(21)}`, ['label.value-too-long']],
    ['a blank in a lot', '(10)A B', ['label.value-format']],
    ['a month 13', '(11)251301', ['label.date']],
    ['a quantity of 0', '(37)0(02)09521234543213(00)123456789012345675', ['label.quantity']],
    ['a broken quantity', '(30)2.5', ['label.quantity']],
    ['two different lots', '(10)A(10)B', ['label.repeated']],
    ['no identifier', ']C1ABC', ['label.identifier']],
    ['brackets around letters', '(10)A(XY)B', ['label.identifier']],
  ])('refuses %s', (_, text, expected) => {
    expect(codes(parseLabel(text))).toEqual(expected)
  })

  it('says which check digit it should be', () => {
    const reading = parseLabel('0109521234543214')
    expect(reading.ok || reading.faults[0]!.sentence).toBe('The check digit of (01) GTIN is 4, but the digits before it give 3.')
  })
})

describe('parseLabel on a plain code', () => {
  it.each(['71-4452', '20240611', '1012345', 'ambrel 12', 'Q-778', 'P', 'HELLO'])('takes "%s" as mere text', (text) => {
    expect(read(parseLabel(text))).toMatchObject({ kind: 'plain', text, elements: [] })
  })

  it.each([['Q240', { quantity: 240 }], ['S0001', { serial: '0001' }], ['1TL5', { lot: 'L5' }]])('reads "%s" by its identifier and keeps the text', (text, fields) => {
    expect(read(parseLabel(text))).toMatchObject({ kind: 'plain', text, ...fields })
  })

  it('refuses a linear quantity of 0', () => {
    expect(codes(parseLabel('Q0'))).toEqual(['label.quantity'])
  })

  it.each(['', '  \r\n', '\u001D'])('refuses an empty scan', (text) => {
    expect(codes(parseLabel(text))).toEqual(['label.empty'])
  })

  it('takes 4 096 characters and refuses one more', () => {
    expect(parseLabel('x'.repeat(4096)).ok).toBe(true)
    expect(codes(parseLabel('x'.repeat(4097)))).toEqual(['label.too-long'])
  })

  it('never throws on 3 000 scrambled labels', () => {
    let seed = 7
    const random = (below: number) => (seed = (seed * 48271) % 2147483647) % below
    for (let i = 0; i < 3000; i++) {
      const characters = [...(i % 2 ? GOOD : '010952123454321310ABC123\u001D2112345')]
      for (let j = 0; j < 1 + (i % 4); j++) characters.splice(random(characters.length), random(3), String.fromCharCode(random(128)))
      const reading = parseLabel(characters.join(''))
      expect(typeof reading.ok).toBe('boolean')
    }
  })
})
