import type { CharacteristicUnit } from '../terms/measurement'

/** A figure for people: number and unit apart, so that they can be set in their own faces. */
export interface QuantityText {
  text: string
  /** '' for a plain number. */
  unit: string
}

/** The figures of one row of a table, in its unit (`N·m`, `%`, `1`, `rad`). */
export interface QuantityRow {
  value: number | null
  expandedUncertainty: number | null
  lower: number | null
  upper: number | null
  unit: CharacteristicUnit
}

/** The same figures in one common unit with the same number of decimals. */
export interface RowText {
  unit: string
  /** Stored unit × factor = shown unit. */
  factor: number
  decimals: number
  value: string | null
  expandedUncertainty: string | null
  lower: string | null
  upper: string | null
}

const SIGNIFICANT_DIGITS = 3
const MOST_DECIMALS = 9
/** The micro sign as Greek letter (U+03BC), which the project's faces hold. */
const MICRO = '\u03BC'

interface Prefix { unit: string; factor: number }

const round = (value: number, digits: number): number => Number(value.toPrecision(digits))

function prefixFor(largest: number, unit: CharacteristicUnit): Prefix {
  if (unit === '%') return { unit: '%', factor: 1 }
  if (unit === '1') return { unit: '', factor: 1 }
  if (unit === 'rad') return { unit: '°', factor: 180 / Math.PI }
  const rounded = round(largest, SIGNIFICANT_DIGITS)
  if (rounded >= 1) return { unit: 'N·m', factor: 1 }
  if (rounded >= 1e-3 || rounded === 0) return { unit: 'mN·m', factor: 1e3 }
  return { unit: `${MICRO}N·m`, factor: 1e6 }
}

/** Decimals that show a number with so many significant digits. */
function decimalsFor(value: number, digits: number): number {
  if (value === 0) return digits - 1
  const exponent = Number(Math.abs(value).toExponential(digits - 1).split('e')[1])
  return Math.min(MOST_DECIMALS, Math.max(0, digits - 1 - exponent))
}

/** Decimals that a typed limit has, so that it is never shown rounded. */
function decimalsOf(value: number): number {
  const [mantissa, exponent] = round(value, 9).toExponential().split('e')
  const fraction = mantissa!.split('.')[1]?.length ?? 0
  return Math.min(6, Math.max(0, fraction - Number(exponent)))
}

/** toFixed with a true minus sign, without "−0.00", and without the noise of the unit's conversion. */
export function formatDecimals(value: number, decimals: number): string {
  const text = round(value, 15).toFixed(decimals)
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '\u2212')
}

function requireFinite(name: string, values: readonly (number | null)[]): void {
  for (const value of values) {
    if (value !== null && !Number.isFinite(value)) throw new RangeError(`${name}: figures must be finite, got ${value}`)
  }
}

/**
 * A figure with three significant digits and a prefix unit by its size: 0.00683 N·m → 6.83 mN·m.
 *
 * @param value figure in `unit`, finite
 * @param unit `N·m`, `%`, `1` or `rad` (shown in degrees)
 * @returns text (minus sign U+2212) and unit
 * @throws RangeError when the value is not finite
 */
export function formatQuantity(value: number, unit: CharacteristicUnit): QuantityText {
  requireFinite('formatQuantity', [value])
  const prefix = prefixFor(Math.abs(value), unit)
  const shown = value * prefix.factor
  return { text: formatDecimals(shown, decimalsFor(shown, SIGNIFICANT_DIGITS)), unit: prefix.unit }
}

/**
 * Value, uncertainty and limits of one row in one common unit, with the same decimals.
 *
 * The unit goes by the largest of value and limits, three significant digits of it; more decimals where a typed limit
 * has them, where the value or its uncertainty would vanish, and where value and limit differ but would look the same.
 *
 * @param row figures in `row.unit`, finite or null
 * @returns the texts, and unit, factor and decimals to show further figures alike
 * @throws RangeError when a figure is not finite
 */
export function formatRow(row: QuantityRow): RowText {
  const { value, expandedUncertainty, lower, upper } = row
  requireFinite('formatRow', [value, expandedUncertainty, lower, upper])
  const limits = [lower, upper].filter(each => each !== null)
  const sized = [value, ...limits].filter(each => each !== null).map(Math.abs)
  const { unit, factor } = prefixFor(Math.max(...sized, sized.length === 0 ? Math.abs(expandedUncertainty ?? 0) : 0), row.unit)
  const least = [decimalsFor(Math.max(0, ...sized) * factor, SIGNIFICANT_DIGITS), ...limits.map(each => decimalsOf(each * factor))]
  if (value) least.push(decimalsFor(value * factor, 2))
  let decimals = Math.max(...least)
  // An uncertainty far below the last digit shown may add two decimals, not more.
  if (expandedUncertainty) decimals = Math.max(decimals, Math.min(decimals + 2, decimalsFor(expandedUncertainty * factor, 1)))
  const show = (figure: number | null): string | null => figure === null ? null : formatDecimals(figure * factor, decimals)
  while (decimals < MOST_DECIMALS && value !== null && limits.some(each => each !== value && show(each) === show(value))) decimals++
  return { unit, factor, decimals, value: show(value), expandedUncertainty: show(expandedUncertainty), lower: show(lower), upper: show(upper) }
}

/** Number and unit in one text: "6.83 mN·m", "12.3 %", "4.50°", "0.98". */
export function joinQuantity(text: string, unit: string): string {
  return unit === '' || unit === '°' ? `${text}${unit}` : `${text} ${unit}`
}
