import { describe, expect, it } from 'vitest'
import { parseUnit, unitInHeader, unitNames, unitScale } from '#shared/compute/intake/units'

describe('parseUnit', () => {
  it.each([
    ['torque', 'mN·m', ['mN.m', 'mNm', 'mN·m', '[mN·m]', '(mNm)', 'mN*m', 'mN m', 'mN-m', 'millinewton metres', 'mN⋅m']],
    ['torque', 'N·m', ['Nm', 'N·m', 'N.m', '[Nm]']],
    ['torque', 'µN·m', ['µN·m', 'μNm', 'uNm', 'uN.m']],
    ['torque', 'N·cm', ['Ncm', 'N·cm', 'cN·m']],
    ['torque', 'ozf·in', ['ozf·in', 'oz-in', 'ozin', 'oz.in', 'in-oz', 'ozf-in']],
    ['torque', 'gf·cm', ['gf·cm', 'g-cm', 'gcm', 'gf.cm']],
    ['torque', 'kgf·cm', ['kgf·cm', 'kg-cm', 'kgcm']],
    ['angle', 'deg', ['deg', '(deg)', '°', '[°]', 'degrees', 'Degree']],
    ['angle', 'rad', ['rad', '[rad]', 'radians']],
    ['angle', 'turn', ['turn', 'rev', 'revolutions']],
    ['angle', 'counts/8192', ['counts/8192', 'counts of 8192', 'counts (8192)', '8192 counts/turn', '8192 cpr']],
    ['current', 'mA', ['mA', '[mA]', 'milliamps']],
    ['voltage', 'mV', ['mV']],
    ['time', 'µs', ['us', 'µs', 'μs']],
    ['time', 'ms', ['ms', '[ms]']],
    ['speed', 'rpm', ['rpm', '1/min', 'min-1']],
    ['duty', 'counts/2000', ['counts/2000']],
  ] as const)('reads %s in %s from all its spellings', (role, unit, spellings) => {
    for (const spelling of spellings) expect(parseUnit(role, spelling), spelling).toBe(unit)
  })

  it('knows every name that it gives', () => {
    for (const role of ['angle', 'torque', 'current', 'voltage', 'time', 'speed', 'duty', 'bus', 'temperature'] as const) {
      for (const name of unitNames(role)) {
        const concrete = name.replace('N', name === 'counts/N' ? '4096' : 'N')
        expect(parseUnit(role, concrete), concrete).toBe(concrete)
        expect(unitScale(role, concrete)).toBeGreaterThan(0)
      }
    }
  })

  it('does not take counts without a number, mega for milli, or what it does not know', () => {
    for (const [role, text] of [['angle', 'counts'], ['torque', 'MNm'], ['torque', 'lbf·ft'], ['torque', ''], ['angle', '360'], ['torque', 'counts/100'], ['angle', 'counts/0']] as const) {
      expect(parseUnit(role, text), text).toBeNull()
    }
  })
})

describe('unitScale', () => {
  /** Exact by definition: pound 0.45359237 kg, inch 25.4 mm, standard gravity 9.80665 m/s². */
  it.each([
    ['torque', 'ozf·in', 0.00706155181422604], ['torque', 'gf·cm', 9.80665e-5], ['torque', 'kgf·cm', 0.0980665], ['torque', 'N·cm', 0.01], ['torque', 'µN·m', 1e-6],
    ['angle', 'deg', Math.PI / 180], ['angle', 'turn', 2 * Math.PI], ['angle', 'counts/8192', (2 * Math.PI) / 8192], ['time', 'µs', 1e-6],
  ] as const)('of %s in %s is %f', (role, unit, scale) => {
    expect(unitScale(role, unit) / scale).toBeCloseTo(1, 14)
  })

  it('throws for a unit that the table does not have', () => {
    expect(() => unitScale('torque', 'furlong')).toThrow(RangeError)
    expect(() => unitScale('torque', 'counts/8192')).toThrow(RangeError)
  })
})

describe('unitInHeader', () => {
  it.each([
    ['angle', 'angle_deg', 'deg'], ['angle', 'Angle / deg', 'deg'], ['angle', 'Position (°)', 'deg'], ['angle', 'Winkel [°]', 'deg'], ['angle', 'Shaft angle [rad]', 'rad'],
    ['angle', 'Angle°', 'deg'], ['angle', 'position_counts/8192', 'counts/8192'], ['angle', 'encoder [counts/4096]', 'counts/4096'],
    ['torque', 'torque_mN.m', 'mN·m'], ['torque', 'Torque [mN·m]', 'mN·m'], ['torque', 'M / mN m', 'mN·m'], ['torque', 'torque oz-in', 'ozf·in'], ['torque', 'Torque, Nm', 'N·m'],
    ['time', 'time_s', 's'], ['time', 't (ms)', 'ms'],
  ] as const)('finds in the %s header "%s" the unit %s', (role, header, unit) => {
    expect(unitInHeader(role, header)).toBe(unit)
  })

  it.each([['angle', 'position_counts'], ['torque', 'torque'], ['torque', 'Torque (filtered)'], ['time', 't'], ['current', 'a']] as const)('finds in the %s header "%s" none', (role, header) => {
    expect(unitInHeader(role, header)).toBeNull()
  })
})
