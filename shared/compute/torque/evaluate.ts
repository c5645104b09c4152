import type { FourierSeries } from '../terms/measurement'

/**
 * Values of a Fourier series at equal steps round one turn.
 *
 * value(θ_i) = mean + Σ_k (cos_k · cos kθ_i + sin_k · sin kθ_i), θ_i = 2π i / points.
 *
 * @param series - coefficients of orders 1…K, N·m
 * @param points - number of values, a whole number from 1
 * @returns the values, N·m
 * @throws RangeError when `points` is not a whole number of its domain
 */
export function evaluateSeries(series: FourierSeries, points: number): Float64Array {
  if (!Number.isInteger(points) || points < 1) throw new RangeError(`evaluateSeries: points must be a whole number from 1, not ${points}`)
  const cosines = Float64Array.from({ length: points }, (_, index) => Math.cos((2 * Math.PI * index) / points))
  const sines = Float64Array.from({ length: points }, (_, index) => Math.sin((2 * Math.PI * index) / points))
  const values = new Float64Array(points).fill(series.meanNm)
  for (let order = 1; order <= series.cosNm.length; order++) {
    const cosine = series.cosNm[order - 1]!
    const sine = series.sinNm[order - 1]!
    if (cosine === 0 && sine === 0) continue
    // k·i modulo the number of points keeps every angle inside the two tables.
    for (let index = 0, place = 0; index < points; index++, place = (place + order) % points) {
      values[index]! += cosine * cosines[place]! + sine * sines[place]!
    }
  }
  return values
}

/**
 * Value of a Fourier series at one angle, with its first two derivatives.
 *
 * @param series - coefficients of orders 1…K, N·m
 * @param angleRad - mechanical angle
 * @returns value (N·m), slope (N·m/rad) and curvature (N·m/rad²)
 */
export function evaluateAt(series: FourierSeries, angleRad: number): { value: number; slope: number; curvature: number } {
  let value = series.meanNm
  let slope = 0
  let curvature = 0
  // cos kθ and sin kθ by rotation; the error grows as k times the rounding of a double.
  const stepCosine = Math.cos(angleRad)
  const stepSine = Math.sin(angleRad)
  let cosine = 1
  let sine = 0
  for (let order = 1; order <= series.cosNm.length; order++) {
    const turned = cosine * stepCosine - sine * stepSine
    sine = sine * stepCosine + cosine * stepSine
    cosine = turned
    const here = series.cosNm[order - 1]! * cosine + series.sinNm[order - 1]! * sine
    value += here
    slope += order * (series.sinNm[order - 1]! * cosine - series.cosNm[order - 1]! * sine)
    curvature -= order * order * here
  }
  return { value, slope, curvature }
}
