/**
 * Four-digit year of a two-digit one by the century rule: a year 51 to 99 above the current one's last two digits is of the
 * last century, one 50 to 99 below of the next.
 *
 * @param twoDigits 0…99
 * @param currentYear four-digit year now
 * @returns four-digit year
 * @throws RangeError outside these domains
 * Source: GS1 General Specifications, 7.12 (from memory).
 */
export function gs1Year(twoDigits: number, currentYear: number): number {
  if (!Number.isInteger(twoDigits) || twoDigits < 0 || twoDigits > 99) throw new RangeError(`gs1Year: twoDigits must be from 0 to 99, got ${twoDigits}`)
  if (!Number.isInteger(currentYear) || currentYear < 1000 || currentYear > 9999) {
    throw new RangeError(`gs1Year: currentYear must have four digits, got ${currentYear}`)
  }
  const century = currentYear - (currentYear % 100)
  const difference = twoDigits - (currentYear % 100)
  return century + twoDigits + (difference >= 51 ? -100 : difference <= -50 ? 100 : 0)
}

const lastDay = (year: number, month: number): number => new Date(Date.UTC(year, month, 0)).getUTCDate()

/**
 * Date of a GS1 element YYMMDD; day 00 stands for the last day of the month.
 *
 * @param text six digits
 * @param currentYear four-digit year now
 * @returns ISO 8601 date, or null when there is no such day
 * @throws RangeError when currentYear has not four digits
 * Source: GS1 General Specifications, 3.4 and 7.12.
 */
export function gs1Date(text: string, currentYear: number): string | null {
  if (!/^\d{6}$/.test(text)) return null
  const year = gs1Year(Number(text.slice(0, 2)), currentYear)
  const month = Number(text.slice(2, 4))
  if (month < 1 || month > 12) return null
  const day = Number(text.slice(4)) || lastDay(year, month)
  if (day > lastDay(year, month)) return null
  return `${year}-${text.slice(2, 4)}-${String(day).padStart(2, '0')}`
}
