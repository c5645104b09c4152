import type { NonconformityClass } from '../terms/judgement'

export const NONCONFORMITY_CLASSES: readonly NonconformityClass[] = ['critical', 'major', 'minor']

/**
 * A count for people, thousands set apart by a no-break space (U+00A0): 1200 → "1 200".
 *
 * @param count whole number ≥ 0
 * @returns the digits with separators
 * @throws RangeError when the count is negative or not whole
 */
export function formatCount(count: number): string {
  if (!Number.isSafeInteger(count) || count < 0) {
    throw new RangeError(`formatCount: count must be a whole number ≥ 0, got ${count}`)
  }
  return String(count).replace(/\B(?=(\d{3})+$)/g, '\u00A0')
}

/** "a", "a and b", "a, b and c". */
export function joinWords(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`
}

export const capitalise = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)
