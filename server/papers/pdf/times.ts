const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

/** Writes stored times for people in the paper's zone. */
export type TimeFormat = (iso: string) => string

/** "17 Nov 2026, 14:05" in that zone. The months are the paper's own, so that it reads the same whatever the machine's language data. */
export function timeFormat(timeZone: string): TimeFormat {
  const format = new Intl.DateTimeFormat('en-GB', { timeZone, day: 'numeric', month: 'numeric', year: 'numeric', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' })
  return (iso) => {
    const parts = Object.fromEntries(format.formatToParts(new Date(iso)).map(part => [part.type, part.value]))
    return `${Number(parts.day)} ${MONTHS[Number(parts.month) - 1]} ${parts.year}, ${parts.hour}:${parts.minute}`
  }
}

/** "11 May 2027" from a calendar date as stored; other text stays as it is. */
export function dateText(date: string): string {
  const [, year, month, day] = /^(\d{4})-(\d{2})-(\d{2})/.exec(date) ?? []
  return day ? `${Number(day)} ${MONTHS[Number(month) - 1]} ${year}` : date || 'not stated'
}
