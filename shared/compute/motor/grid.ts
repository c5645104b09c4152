import type { MotorDesign } from '../terms/motor'
import { designOrder } from './design-order'

const DEFAULT_MULTIPLE = 3
const LEAST_ORDER = 64
const DEFAULT_BINS = 4096
const BINS_A_PERIOD = 16
const MOST_BINS = 2 ** 20

/**
 * Highest order fitted when a sheet asks for none: three times the design order and at least 64.
 *
 * @param design - the motor
 * @returns order, cycles per turn
 * @throws RangeError as `designOrder`
 */
export function defaultHighestOrder(design: MotorDesign): number {
  return Math.max(LEAST_ORDER, DEFAULT_MULTIPLE * designOrder(design))
}

/**
 * Bins per turn for a highest order: a power of two, 16 × the order or more, and 4096 or more.
 *
 * @param highestOrder - 1…65536
 * @returns number of bins M
 * @throws RangeError when the order is not a whole number of its domain
 */
export function binCount(highestOrder: number): number {
  if (!Number.isInteger(highestOrder) || highestOrder < 1 || highestOrder * BINS_A_PERIOD > MOST_BINS) {
    throw new RangeError(`binCount: highestOrder must be a whole number from 1 to ${MOST_BINS / BINS_A_PERIOD}, not ${highestOrder}`)
  }
  let bins = DEFAULT_BINS
  while (bins < BINS_A_PERIOD * highestOrder) bins *= 2
  return bins
}
