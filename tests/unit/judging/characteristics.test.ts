import { describe, expect, it } from 'vitest'
import { CHARACTERISTIC_KEYS, describeCharacteristic, isCharacteristicKey } from '#shared/compute/judging/characteristics'
import { formatQuantity, formatRow, joinQuantity } from '#shared/compute/judging/quantities'

describe('describeCharacteristic', () => {
  it('describes every fixed key with a name of its own', () => {
    const labels = CHARACTERISTIC_KEYS.map(key => describeCharacteristic(key).label)
    expect(new Set(labels).size).toBe(CHARACTERISTIC_KEYS.length)
  })

  it.each([
    ['cogging.peakToPeak', 'Cogging, peak to peak', 'N·m', 'upper', 'mN·m'], ['order.12', 'Order 12', 'N·m', 'upper', 'mN·m'],
    ['group.rotorSide', 'Rotor side, RMS', 'N·m', 'upper', 'mN·m'], ['rippleRatio', 'Ripple ratio', '%', 'upper', '%'],
    ['referenceMatch', 'Match with the reference map', '1', 'lower', ''],
  ])('describes %s', (key, label, unit, limitedSide, displayUnit) => {
    expect(describeCharacteristic(key)).toMatchObject({ key, label, unit, limitedSide, displayUnit, digits: 3 })
  })

  it.each([['order.1', true], ['order.9999', true], ['order.0', false], ['order.10000', false], ['order.1.5', false], ['order.', false],
    ['toString', false], ['', false], ['rippleRatio', true]])('knows that "%s" is a key: %s', (key, expected) => {
    expect(isCharacteristicKey(key)).toBe(expected)
  })

  it('refuses an unknown key', () => {
    expect(() => describeCharacteristic('constructor')).toThrow(RangeError)
  })
})

describe('formatQuantity', () => {
  it.each([
    [0.00683, 'N·m', '6.83', 'mN·m'], [0.0123456, 'N·m', '12.3', 'mN·m'], [0.000512, 'N·m', '512', '\u03BCN·m'], [1.5, 'N·m', '1.50', 'N·m'],
    [0.0009996, 'N·m', '1.00', 'mN·m'], [0.0009994, 'N·m', '999', '\u03BCN·m'], [0.9999, 'N·m', '1.00', 'N·m'], [0, 'N·m', '0.00', 'mN·m'],
    [-0.00683, 'N·m', '\u22126.83', 'mN·m'], [12.345, '%', '12.3', '%'], [0.98765, '1', '0.988', ''], [Math.PI / 2, 'rad', '90.0', '°'],
  ] as const)('writes %d %s as %s %s', (value, unit, text, shownUnit) => {
    expect(formatQuantity(value, unit)).toEqual({ text, unit: shownUnit })
  })

  it.each([Number.NaN, Infinity])('refuses %s', (value) => {
    expect(() => formatQuantity(value, 'N·m')).toThrow(RangeError)
  })
})

describe('formatRow', () => {
  const row = { value: 0.00683, expandedUncertainty: 0.00031, lower: null, upper: 0.0054, unit: 'N·m' as const }

  it('shows value, uncertainty and limit in one unit with the same decimals', () => {
    expect(formatRow(row)).toMatchObject({ unit: 'mN·m', decimals: 2, value: '6.83', expandedUncertainty: '0.31', lower: null, upper: '5.40' })
  })

  it('takes the unit of the largest of value and limit', () => {
    expect(formatRow({ ...row, value: 0.000512 })).toMatchObject({ unit: 'mN·m', value: '0.51', upper: '5.40' })
  })

  it('never rounds a typed limit', () => {
    expect(formatRow({ ...row, value: 0.01234, upper: 0.00545 })).toMatchObject({ value: '12.34', upper: '5.45' })
  })

  it('adds decimals until a value that differs from its limit looks different', () => {
    expect(formatRow({ ...row, value: 0.0054004 })).toMatchObject({ value: '5.4004', upper: '5.4000' })
  })

  it('shows a small uncertainty with one digit, by two more decimals at most', () => {
    expect(formatRow({ ...row, expandedUncertainty: 0.000002 }).expandedUncertainty).toBe('0.002')
    expect(formatRow({ ...row, expandedUncertainty: 0.00000001 }).expandedUncertainty).toBe('0.0000')
  })

  it('keeps what is not stated as null', () => {
    expect(formatRow({ ...row, value: null, expandedUncertainty: null })).toMatchObject({ unit: 'mN·m', value: null, expandedUncertainty: null, upper: '5.40' })
  })
})

describe('joinQuantity', () => {
  it.each([['6.83', 'mN·m', '6.83 mN·m'], ['90.0', '°', '90.0°'], ['0.98', '', '0.98']])('joins %s and %s', (text, unit, joined) => {
    expect(joinQuantity(text, unit)).toBe(joined)
  })
})
