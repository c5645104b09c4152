import type { MotorDesign } from '../terms/motor'
import { originOfOrder } from '../motor/origins'
import { symmetryOf } from '../motor/design-order'
import { amplitudeOf, phaseOf, type MapEstimate } from './estimate'

/* Limits of this file are common practice, no source. */
/** A carrier is this many times the threshold of significance and its larger sideband. */
const CARRIER_RATIO = 3
const MOST_UNEQUAL = 2
const PHASE_TOLERANCE_DEG = 35

/** A strong order with a pair of sidebands, one order below and one above. */
export interface SidebandPair {
  order: number
  kind: 'angle sensor' | 'modulation'
  /** (A₋ + A₊)/(k·A_k): for an eccentric angle sensor its eccentricity, rad. */
  depthRad: number
  weight: number
}

function pairAt(estimate: MapEstimate, order: number, threshold: number, isOther: (order: number) => boolean): SidebandPair | null {
  const { cogging, highestOrder } = estimate
  if (order < 3 || order + 1 > highestOrder || !isOther(order - 1) || !isOther(order + 1)) return null
  const below = amplitudeOf(cogging, order - 1)
  const above = amplitudeOf(cogging, order + 1)
  if (amplitudeOf(cogging, order) < CARRIER_RATIO * Math.max(below, above)) return null
  if (Math.min(below, above) < threshold || Math.max(below, above) > MOST_UNEQUAL * Math.min(below, above)) return null
  const sum = phaseOf(cogging, order - 1) + phaseOf(cogging, order + 1) - 2 * phaseOf(cogging, order)
  const offZero = Math.abs(sum - 360 * Math.round(sum / 360))
  const kind = offZero <= PHASE_TOLERANCE_DEG ? 'modulation' : 180 - offZero <= PHASE_TOLERANCE_DEG ? 'angle sensor' : null
  const size = order * amplitudeOf(cogging, order)
  return kind && { order, kind, depthRad: (below + above) / size, weight: size ** 2 }
}

/**
 * Finds sidebands k ± 1 of strong orders k.
 *
 * An angle sensor whose disc is eccentric by ε makes θ read θ + ε·cos(θ + …); order k then shows A_k·k·ε/2 at k ± 1 with φ₋ + φ₊ − 2φ_k = 180°. A true modulation of the amplitude over the turn
 * shows the same pair with a sum of 0°. Only orders that the motor itself does not explain are taken for sidebands.
 *
 * @param estimate - the map
 * @param threshold - amplitude above which an order is significant, N·m
 * @param design - the motor
 * @returns the pairs found
 */
export function findSidebands(estimate: MapEstimate, threshold: number, design: MotorDesign): SidebandPair[] {
  const orders = Array.from({ length: estimate.highestOrder }, (_, index) => index + 1)
  const isOther = (order: number) => ['other', 'turn'].includes(originOfOrder(order, design).origins[0]!)
  return orders.filter((order) => threshold > 0 && amplitudeOf(estimate.cogging, order) >= CARRIER_RATIO * threshold)
    .map((order) => pairAt(estimate, order, threshold, isOther))
    .filter((pair): pair is SidebandPair => pair !== null)
}

/**
 * Eccentricity of the angle sensor from its sidebands, weighted by (k·A_k)².
 *
 * @param pairs - sidebands found
 * @returns ε, rad, and its sum of weights; null when no pair shows it
 */
export function angleSensorEccentricity(pairs: SidebandPair[]): { eccentricityRad: number; weight: number } | null {
  const own = pairs.filter((pair) => pair.kind === 'angle sensor')
  const weight = own.reduce((sum, pair) => sum + pair.weight, 0)
  if (weight === 0) return null
  return { eccentricityRad: own.reduce((sum, pair) => sum + pair.weight * pair.depthRad, 0) / weight, weight }
}

/**
 * Reason for an order that is a sideband; null when it is none.
 *
 * @param order - the order
 * @param pairs - sidebands found
 * @param design - the motor; eccentricity is not named where it makes no new order
 */
export function sidebandReason(order: number, pairs: SidebandPair[], design: MotorDesign): string | null {
  const pair = pairs.filter((candidate) => Math.abs(candidate.order - order) === 1).sort((a, b) => b.weight - a.weight)[0]
  if (!pair) return null
  if (pair.kind === 'angle sensor') return `Sideband of order ${pair.order} with the phase of an eccentric angle sensor: the rig, not the motor.`
  const eccentric = design.kind === 'brushless' && symmetryOf(design) >= 3 ? '' : ', as with an eccentric air gap'
  return `Sideband of order ${pair.order}, whose amplitude changes once per turn${eccentric}.`
}
