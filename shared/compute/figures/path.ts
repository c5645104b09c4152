/** A number for a path: two decimals unless told, no "-0", no exponent; the same on every machine. */
export function coordinate(value: number, decimals = 2): string {
  const text = value.toFixed(decimals).replace(/\.?0+$/, '')
  return text === '-0' ? '0' : text
}

export interface Point { x: number; y: number }

/** A path through points: `M x y L x y …`, closed with Z when asked. */
export function polyline(points: readonly Point[], closed = false, decimals = 2): string {
  const pairs = points.map(point => `${coordinate(point.x, decimals)} ${coordinate(point.y, decimals)}`)
  return pairs.length === 0 ? '' : `M${pairs.join('L')}${closed ? 'Z' : ''}`
}

/** A full circle as two arcs, so that it can be drawn where only paths are known. */
export function circlePath(x: number, y: number, radius: number, clockwise = true): string {
  const left = coordinate(x - radius)
  const right = coordinate(x + radius)
  const arc = `A${coordinate(radius)} ${coordinate(radius)} 0 1 ${clockwise ? 1 : 0}`
  return `M${left} ${coordinate(y)}${arc} ${right} ${coordinate(y)}${arc} ${left} ${coordinate(y)}Z`
}

/** The area between two circles; they run against each other, so that it is one ring under either fill rule. */
export function annulusPath(x: number, y: number, outer: number, inner: number): string {
  return circlePath(x, y, outer) + circlePath(x, y, inner, false)
}
