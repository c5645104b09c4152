/** How a torque is written for people, unit and all; given by the caller, so that a picture says a figure as its page does. */
export type TorqueText = (torqueNm: number) => string

/** Lowest and highest of a series. */
export function extremes(values: ArrayLike<number>): { low: number; high: number } {
  let low = Infinity
  let high = -Infinity
  for (let index = 0; index < values.length; index++) {
    low = Math.min(low, values[index]!)
    high = Math.max(high, values[index]!)
  }
  return { low, high }
}

/**
 * Indices that a picture of so many columns needs: per column the lowest and the highest value, in order.
 *
 * The eye sees the same as with every value, the path stays short. A series of two values a column or fewer is kept whole.
 */
export function extremesByColumn(values: ArrayLike<number>, columns: number): number[] {
  const count = Math.max(1, Math.round(columns))
  if (values.length <= 2 * count) return Array.from(values, (_, index) => index)
  const kept: number[] = []
  for (let column = 0; column < count; column++) {
    const from = Math.floor(column * values.length / count)
    const to = Math.floor((column + 1) * values.length / count)
    let low = from
    let high = from
    for (let index = from; index < to; index++) {
      if (values[index]! < values[low]!) low = index
      if (values[index]! > values[high]!) high = index
    }
    kept.push(...(low === high ? [low] : low < high ? [low, high] : [high, low]))
  }
  return kept
}
