import type { AnalysisSettings, OrderAmplitude } from '../terms/measurement'
import type { Origin } from '../terms/motor'
import { originOfOrder, type Circumstance } from '../motor/origins'
import { amplitudeOf, phaseOf, rmsOf, type MapEstimate } from './estimate'
import { isLoaded } from './ripple'
import { significantAmplitude } from './significance'
import { findSidebands, sidebandReason, type SidebandPair } from './sidebands'
import { COVERAGE_FACTOR, expandedNm } from './uncertainty'

/** The orders of a map, judged against its noise. */
export interface OrderTable {
  /** Significant orders, and those that a limit names, by order. */
  listed: OrderAmplitude[]
  significant: OrderAmplitude[]
  sidebands: SidebandPair[]
  /** Amplitude above which an order is significant, N·m. */
  thresholdNm: number
}

/** Whether current flowed in the windings. The peak-to-peak of a sine of the same RMS is enough to see a load. */
function circumstanceOf(estimate: MapEstimate, settings: AnalysisSettings): Circumstance {
  if (settings.method === 'hold') return 'held'
  const half = Math.SQRT2 * rmsOf(estimate.cogging)
  const loaded = isLoaded({ highestNm: half, lowestNm: -half, rmsNm: half, meanNm: estimate.zeroNm, ratedTorqueNm: settings.ratedTorqueNm })
  return loaded ? 'loaded' : 'free'
}

/**
 * Judges every fitted order against the noise, and gives each significant one its origin.
 *
 * @param estimate - the map
 * @param settings - motor, orders named, rig
 */
export function tabulateOrders(estimate: MapEstimate, settings: AnalysisSettings): OrderTable {
  const { cogging, highestOrder, coefficientDeviationNm } = estimate
  const thresholdNm = significantAmplitude(coefficientDeviationNm, highestOrder)
  const circumstance = circumstanceOf(estimate, settings)
  const sidebands = findSidebands(estimate, thresholdNm, settings.design)
  const listed: OrderAmplitude[] = []
  for (let order = 1; order <= highestOrder; order++) {
    const amplitudeNm = amplitudeOf(cogging, order)
    const significant = amplitudeNm > thresholdNm && amplitudeNm > 0
    if (!significant && !settings.ordersNamed.includes(order)) continue
    const origin = originOfOrder(order, settings.design, circumstance)
    const reason = origin.origins[0] === 'other' ? sidebandReason(order, sidebands, settings.design) ?? origin.reason : origin.reason
    listed.push({
      order, amplitudeNm, phaseDeg: phaseOf(cogging, order),
      expandedUncertaintyNm: expandedNm(amplitudeNm, coefficientDeviationNm, settings.rig) ?? COVERAGE_FACTOR * coefficientDeviationNm,
      significant, origins: origin.origins, reason,
    })
  }
  return { listed, significant: listed.filter(({ significant }) => significant), sidebands, thresholdNm }
}

/**
 * RMS of the significant orders of one origin, √(Σ A_k²/2); an order that fits two origins counts in both.
 *
 * @param orders - significant orders
 * @param origin - the origin
 * @returns N·m; 0 when no order of that origin stands above the noise
 */
export function groupRms(orders: OrderAmplitude[], origin: Origin): number {
  return Math.sqrt(orders.filter(({ origins }) => origins.includes(origin)).reduce((sum, { amplitudeNm }) => sum + amplitudeNm ** 2, 0) / 2)
}
