/** A number for a path: two decimals, no "-0", no exponent; the same on every machine. */
export function coordinate(value: number): string {
  const text = value.toFixed(2).replace(/\.?0+$/, '')
  return text === '-0' ? '0' : text
}

export interface Point { x: number; y: number }

/** A path through points: `M x y L x y …`, closed with Z when asked. */
export function polyline(points: readonly Point[], closed = false): string {
  if (points.length === 0) return ''
  const [first, ...rest] = points
  return `M${coordinate(first!.x)} ${coordinate(first!.y)}${rest.map(point => `L${coordinate(point.x)} ${coordinate(point.y)}`).join('')}${closed ? 'Z' : ''}`
}

/** A full circle as two arcs, so that it can be drawn where only paths are known. */
export function circlePath(x: number, y: number, radius: number): string {
  const left = coordinate(x - radius)
  const right = coordinate(x + radius)
  const r = coordinate(radius)
  return `M${left} ${coordinate(y)}A${r} ${r} 0 1 1 ${right} ${coordinate(y)}A${r} ${r} 0 1 1 ${left} ${coordinate(y)}Z`
}
