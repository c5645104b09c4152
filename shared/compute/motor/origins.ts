import type { BrushlessDesign, MotorDesign, Origin, OrderOrigin } from '../terms/motor'
import { designOrder, symmetryOf } from './design-order'

const HIGHEST_TURN_ORDER = 2

const isMultiple = (order: number, of: number) => order % of === 0

/** The order may be made by the machinery about the motor. */
function turnReason(order: number, sayEccentric: boolean): string {
  const often = order === 1 ? 'Once' : 'Twice'
  return `${often} per turn: fixture, coupling or bearing${sayEccentric ? ', or a rotor that runs out of centre' : ''}.`
}

function designReason(order: number, design: BrushlessDesign, lowest: number): string {
  const { slots, poles } = design
  const which = order === lowest ? `Order ${order} is the design order of ${slots} slots and ${poles} poles` : `Order ${order} is ${order / lowest} times the design order ${lowest}`
  if (isMultiple(slots, poles)) return `${which}; with slots a multiple of poles, rotor faults hide in it and cannot be told apart.`
  if (isMultiple(poles, slots)) return `${which}; with poles a multiple of slots, stator faults hide in it and cannot be told apart.`
  return `${which}: every motor of this design has it.`
}

function statorReason(order: number, poles: number, sayEccentric: boolean): string {
  return `A multiple of the ${poles} poles only: something on the stator side, such as a slot opening, a tooth, an oval bore or the lamination${sayEccentric ? ', or a rotor that sits off centre' : ''}.`
}

/** How the map was taken: shaft free of current, windings carrying a load's current, or a drive holding the position. */
export type Circumstance = 'free' | 'loaded' | 'held'

/** What current in the windings adds to the map. */
function driveReason(order: number, poles: number, circumstance: Circumstance): string | null {
  const pairs = poles / 2
  if (circumstance === 'free') return null
  if (circumstance === 'loaded') return order % (6 * pairs) === 0 && order <= 12 * pairs ? 'ripple of the load\'s current or of the winding, not cogging' : null
  if (order === pairs) return 'an offset of the drive\'s current measurement, or a magnet or iron nearby'
  if (order === 2 * pairs) return 'unequal gains of the drive\'s current measurement'
  if (order === 6 * pairs || order === 12 * pairs) return 'the drive\'s dead time'
  return null
}

function brushlessOrigin(order: number, design: BrushlessDesign): OrderOrigin {
  const lowest = designOrder(design)
  // With three or more symmetric sectors a pure eccentricity makes no new order, so it is not named.
  const sayEccentric = symmetryOf(design) < 3
  if (isMultiple(order, lowest)) return { origins: ['design'], reason: designReason(order, design, lowest) }
  const found: { origin: Origin; reason: string }[] = []
  if (isMultiple(order, design.slots)) {
    found.push({ origin: 'rotorSide', reason: `A multiple of the ${design.slots} slots only: something on the rotor side, such as a magnet's strength, place or thickness.` })
  }
  if (isMultiple(order, design.poles)) found.push({ origin: 'statorSide', reason: statorReason(order, design.poles, sayEccentric) })
  if (order <= HIGHEST_TURN_ORDER) found.push({ origin: 'turn', reason: turnReason(order, sayEccentric) })
  if (found.length === 0) {
    return { origins: ['other'], reason: `No multiple of ${design.slots} slots or ${design.poles} poles: rotor and stator faults together, or something outside the motor.` }
  }
  return either(found)
}

function either(found: { origin: Origin; reason: string }[]): OrderOrigin {
  const reasons = found.map(({ reason }) => reason)
  const reason = found.length === 1 ? reasons[0]! : `Either: ${reasons.map((text) => text.replace(/\.$/, '')).join('; or: ')}.`
  return { origins: found.map(({ origin }) => origin), reason }
}

function stepperOrigin(order: number, base: number, design: Exclude<MotorDesign, BrushlessDesign>): OrderOrigin {
  const lowest = designOrder(design)
  if (isMultiple(order, lowest)) {
    const reason = order === lowest ? `Order ${order} is the design order: one period a full step.` : `Order ${order} is ${order / lowest} times the design order ${lowest}.`
    return { origins: ['design'], reason }
  }
  const found: { origin: Origin; reason: string }[] = []
  if (isMultiple(order, base) && design.kind === 'claw-pole stepper') {
    found.push({ origin: 'statorSide', reason: `A multiple of ${base}, half the design order: the two stator stacks are not alike.` })
  }
  if (isMultiple(order, base) && design.kind === 'hybrid stepper') {
    found.push({ origin: 'statorSide', reason: `A multiple of the ${base} rotor teeth: the stator's main poles are not alike.` })
    found.push({ origin: 'rotorSide', reason: 'the two rotor cups are not alike.' })
  }
  if (order <= HIGHEST_TURN_ORDER) found.push({ origin: 'turn', reason: turnReason(order, true) })
  return found.length > 0 ? either(found) : { origins: ['other'], reason: `No multiple of ${base}: several faults together, or something outside the motor.` }
}

/**
 * Where an order of the cogging or detent torque comes from.
 *
 * Brushless with Q slots and 2p poles: multiples of L = lcm(Q, 2p) are the design's; a fault on the rotor leaves only multiples of Q, one on the
 * stator only multiples of 2p; orders 1 and 2 are the shaft's and its fixture's. Claw-pole stepper: multiples of half the design order are unequal
 * stacks. Hybrid stepper with N_r teeth: multiples of N_r are unequal poles or cups. An order that fits two origins gets both ("either").
 * A hold map also carries drive errors at orders p, 2p, 6p and 12p, a map under load the ripple of its current at 6p and 12p.
 *
 * Source: Gašparin et al., IEEE Transactions on Magnetics 45(3), 2009; Islam, Mir and Sebastian, IEEE Transactions on Industry Applications 40(3), 2004
 * (both from memory).
 *
 * @param order - cycles per turn, 1 or more
 * @param design - the motor
 * @param circumstance - how the map was taken
 * @returns one origin, or two, with the reason in one sentence
 * @throws RangeError when the order is not a whole number of its domain, or as `designOrder`
 */
export function originOfOrder(order: number, design: MotorDesign, circumstance: Circumstance = 'free'): OrderOrigin {
  if (!Number.isInteger(order) || order < 1) throw new RangeError(`originOfOrder: order must be a whole number from 1, not ${order}`)
  if (design.kind === 'claw-pole stepper') return stepperOrigin(order, 2 * design.polePairs, design)
  if (design.kind === 'hybrid stepper') return stepperOrigin(order, design.rotorTeeth, design)
  const origin = brushlessOrigin(order, design)
  const drive = driveReason(order, design.poles, circumstance)
  if (drive === null) return origin
  const origins: Origin[] = origin.origins[0] === 'other' ? ['other'] : [...origin.origins, 'other']
  const motor = origin.origins[0] === 'other' ? 'the motor itself' : origin.reason.replace(/^Either: /, '').replace(/\.$/, '')
  return { origins, reason: `Either: ${motor}; or: ${drive}.` }
}
