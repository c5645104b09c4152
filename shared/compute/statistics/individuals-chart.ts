/** Limits of an individuals and moving-range chart. */
export interface IndividualsLimits {
  /** Mean of the individuals. */
  centre: number
  lower: number
  upper: number
  /** Estimated standard deviation, mean moving range ÷ d₂. */
  sigma: number
  movingRangeCentre: number
  movingRangeUpper: number
}

/** d₂ and D₄ for two values a range. Source: Montgomery, Introduction to Statistical Quality Control, appendix VI (exact d₂ = 2/√π). */
const D2 = 2 / Math.sqrt(Math.PI)
const D4 = 3.267

/**
 * Absolute differences of neighbours.
 *
 * @param values individuals in time order, finite.
 * @returns one less than there are values.
 */
export function movingRanges(values: readonly number[]): number[] {
  return values.slice(1).map((value, index) => Math.abs(value - values[index]!))
}

/**
 * Control limits for individuals from a base period: x̄ ± 3·MR̄/d₂, and D₄·MR̄ for the moving range (n = 2).
 *
 * @param base individuals of the base period in time order, at least two, finite.
 * @throws RangeError with fewer than two values or one that is not finite.
 * Source: ISO 7870-2 / Montgomery, section 6.4 (individuals chart).
 */
export function individualsLimits(base: readonly number[]): IndividualsLimits {
  if (base.length < 2) throw new RangeError(`individualsLimits: base must hold two values or more, got ${base.length}`)
  if (!base.every(Number.isFinite)) throw new RangeError('individualsLimits: base must be finite')
  const ranges = movingRanges(base)
  const movingRangeCentre = ranges.reduce((sum, range) => sum + range, 0) / ranges.length
  const centre = base.reduce((sum, value) => sum + value, 0) / base.length
  const sigma = movingRangeCentre / D2
  return { centre, lower: centre - 3 * sigma, upper: centre + 3 * sigma, sigma, movingRangeCentre, movingRangeUpper: D4 * movingRangeCentre }
}
