import type { MotorDesign } from '../terms/motor'

function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b)
}

function checkCount(place: string, value: number, lowest: number, even = false): void {
  if (!Number.isInteger(value) || value < lowest || value > 10_000 || (even && value % 2 !== 0)) {
    throw new RangeError(`${place} must be ${even ? 'an even' : 'a'} whole number from ${lowest} to 10000, not ${value}`)
  }
}

/**
 * Greatest common divisor of slots and poles.
 *
 * @param design - a brushless motor
 * @returns gcd(Q, 2p); 1, or 2, or more
 */
export function symmetryOf(design: { slots: number; poles: number }): number {
  checkCount('symmetryOf: slots', design.slots, 1)
  checkCount('symmetryOf: poles', design.poles, 2, true)
  return greatestCommonDivisor(design.slots, design.poles)
}

/**
 * Design order L: the lowest order of cogging or detent torque that a motor without faults has.
 *
 * Brushless: lcm(Q, 2p) (Zhu and Howe, IEEE Transactions on Energy Conversion 15(4), 2000; from memory).
 * Claw-pole stepper: 4 × pole pairs. Hybrid stepper with two phases: 4 × rotor teeth.
 *
 * @param design - slots 1…10000 and even poles 2…10000; pole pairs or rotor teeth 1…10000
 * @returns L, cycles per mechanical turn
 * @throws RangeError when a count is not a whole number of its domain
 */
export function designOrder(design: MotorDesign): number {
  switch (design.kind) {
    case 'brushless':
      checkCount('designOrder: slots', design.slots, 1)
      checkCount('designOrder: poles', design.poles, 2, true)
      return (design.slots * design.poles) / greatestCommonDivisor(design.slots, design.poles)
    case 'claw-pole stepper':
      checkCount('designOrder: polePairs', design.polePairs, 1)
      return 4 * design.polePairs
    case 'hybrid stepper':
      checkCount('designOrder: rotorTeeth', design.rotorTeeth, 1)
      return 4 * design.rotorTeeth
  }
}
