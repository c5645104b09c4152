/**
 * What a motor's magnetic circuit is, as far as the orders of its cogging torque depend on it.
 * An order is a count of cycles per mechanical turn of the shaft.
 */
export interface BrushlessDesign {
  kind: 'brushless'
  /** Number of stator slots Q. */
  slots: number
  /** Number of rotor poles 2p. */
  poles: number
}

/** Permanent-magnet stepper of claw-pole (can-stack) build, two stacks. */
export interface ClawPoleDesign {
  kind: 'claw-pole stepper'
  /** Number of rotor pole pairs; full steps per turn are four times as many. */
  polePairs: number
}

/** Two-phase hybrid stepper. */
export interface HybridDesign {
  kind: 'hybrid stepper'
  /** Number of rotor teeth N_r; full steps per turn are four times as many. */
  rotorTeeth: number
}

export type MotorDesign = BrushlessDesign | ClawPoleDesign | HybridDesign

/** Where an order of the cogging torque comes from. */
export type Origin = 'design' | 'rotorSide' | 'statorSide' | 'turn' | 'other'

export interface OrderOrigin {
  /** One origin, or two when the order fits both ("either"); the first is the one drawn. */
  origins: Origin[]
  /** One sentence, for people. */
  reason: string
}
