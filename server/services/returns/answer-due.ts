/** Days a supplier has to answer; common practice, no source. */
export const ANSWER_WORKING_DAYS = 10

/** Calendar day of a moment in the plant's time zone, `2026-12-15`. */
export function plantDay(at: Date, timeZone: string): string {
  const parts = new Map(new Intl.DateTimeFormat('en-GB', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }).formatToParts(at).map(part => [part.type, part.value]))
  return `${parts.get('year')}-${parts.get('month')}-${parts.get('day')}`
}

/**
 * The day so many working days later, Monday to Friday; public holidays are not known to the station and count as working days.
 *
 * @param day calendar day, `2026-12-01`.
 * @param count working days, a whole number from 1 to 1000.
 * @throws RangeError when the day is no day or the count is outside its domain.
 */
export function addWorkingDays(day: string, count: number): string {
  const date = new Date(`${day}T00:00:00Z`)
  if (Number.isNaN(date.getTime())) throw new RangeError(`addWorkingDays: day must be a calendar day like 2026-12-01, got ${day}`)
  if (!Number.isInteger(count) || count < 1 || count > 1000) throw new RangeError(`addWorkingDays: count must be a whole number from 1 to 1000, got ${count}`)
  for (let left = count; left > 0;) {
    date.setUTCDate(date.getUTCDate() + 1)
    if (date.getUTCDay() !== 0 && date.getUTCDay() !== 6) left--
  }
  return date.toISOString().slice(0, 10)
}

/** A calendar day as people read it in a mail: "15 December 2026". */
export function dayInWords(day: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone: 'UTC', day: 'numeric', month: 'long', year: 'numeric' }).format(new Date(`${day}T00:00:00Z`))
}
