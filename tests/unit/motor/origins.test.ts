import { describe, expect, it } from 'vitest'
import { designOrder, symmetryOf } from '#shared/compute/motor/design-order'
import { binCount, defaultHighestOrder } from '#shared/compute/motor/grid'
import { originOfOrder } from '#shared/compute/motor/origins'
import type { MotorDesign } from '#shared/compute/terms/motor'
import reference from '../../reference/design-orders.json'

const brushless = (slots: number, poles: number) => ({ kind: 'brushless', slots, poles }) as const
const CLAW: MotorDesign = { kind: 'claw-pole stepper', polePairs: 12 }
const HYBRID: MotorDesign = { kind: 'hybrid stepper', rotorTeeth: 50 }

describe('designOrder', () => {
  it.each(reference.rows)('of $slots slots and $poles poles is $designOrder', ({ slots, poles, designOrder: order }) => {
    expect(designOrder(brushless(slots, poles))).toBe(order)
  })

  it('of a stepper is its full steps a turn', () => {
    expect(designOrder(CLAW)).toBe(48)
    expect(designOrder(HYBRID)).toBe(200)
  })

  it('throws outside its domain', () => {
    for (const design of [brushless(0, 14), brushless(12, 13), brushless(12, 0), brushless(1.5, 14), { kind: 'hybrid stepper', rotorTeeth: 0 }, { kind: 'claw-pole stepper', polePairs: -1 }] as const) {
      expect(() => designOrder(design)).toThrow(RangeError)
    }
    expect(symmetryOf(brushless(12, 14))).toBe(2)
  })
})

describe('defaultHighestOrder and binCount', () => {
  it('is three times the design order and 64 at the least', () => {
    expect(defaultHighestOrder(brushless(12, 14))).toBe(252)
    expect(defaultHighestOrder(brushless(9, 6))).toBe(64)
  })

  it('gives a power of two of 16 bins a period, 4096 at the least', () => {
    expect([1, 256, 257, 600].map(binCount)).toEqual([4096, 4096, 8192, 16_384])
    for (const order of [0, 2.5, 65_537]) expect(() => binCount(order)).toThrow(RangeError)
  })
})

describe('originOfOrder', () => {
  it('parts the orders of 12 slots and 14 poles', () => {
    const found = [84, 168, 12, 36, 14, 98, 1, 2, 5, 83].map((order) => originOfOrder(order, brushless(12, 14)).origins.join('/'))
    expect(found).toEqual(['design', 'design', 'rotorSide', 'rotorSide', 'statorSide', 'statorSide', 'turn', 'turn', 'other', 'other'])
  })

  it('says that rotor faults hide where slots are a multiple of poles, and stator faults where poles are of slots', () => {
    expect(originOfOrder(24, brushless(24, 8)).reason).toContain('rotor faults hide')
    expect(originOfOrder(24, brushless(12, 24)).reason).toContain('stator faults hide')
    expect(originOfOrder(84, brushless(12, 14)).reason).not.toContain('hide')
  })

  it('gives both origins and "either" where an order fits two', () => {
    const twoPole = originOfOrder(2, brushless(3, 2))
    expect(twoPole.origins).toEqual(['statorSide', 'turn'])
    expect(twoPole.reason).toMatch(/^Either: .*; or: /)
    expect(originOfOrder(100, HYBRID).origins).toEqual(['statorSide', 'rotorSide'])
  })

  /** With gcd(Q, 2p) ≥ 3 a pure eccentricity makes no new order. */
  it('names eccentricity only where slots and poles have no common divisor of three or more', () => {
    expect(originOfOrder(8, brushless(9, 8)).reason).toContain('off centre')
    for (const order of [1, 2, 8, 16]) expect(originOfOrder(order, brushless(12, 8)).reason).not.toMatch(/centr/)
  })

  it('lays half the design order of a claw-pole stepper to unequal stacks', () => {
    expect(originOfOrder(24, CLAW)).toMatchObject({ origins: ['statorSide'], reason: expect.stringContaining('stacks') })
    expect(originOfOrder(48, CLAW).origins).toEqual(['design'])
    expect(originOfOrder(12, CLAW).origins).toEqual(['other'])
  })

  it('adds the drive to orders p, 2p, 6p and 12p of a held map, and only there', () => {
    for (const order of [7, 14, 42, 84]) expect(originOfOrder(order, brushless(12, 14), 'held').origins).toContain('other')
    expect(originOfOrder(28, brushless(12, 14), 'held').origins).toEqual(['statorSide'])
    expect(originOfOrder(42, brushless(12, 14)).origins).toEqual(['statorSide'])
  })

  it('gives every order one origin or two and a sentence', () => {
    for (const design of [brushless(12, 14), brushless(9, 8), brushless(36, 42), CLAW, HYBRID]) {
      for (let order = 1; order <= 300; order++) {
        const { origins, reason } = originOfOrder(order, design, 'held')
        expect(origins.length).toBeGreaterThan(0)
        expect(reason).toMatch(/^[A-Z].*\.$/)
      }
    }
  })

  it('throws for an order that is no whole number from 1', () => {
    for (const order of [0, -1, 1.5]) expect(() => originOfOrder(order, brushless(12, 14))).toThrow(RangeError)
  })
})
