/** Times are shown in the plant's zone, alike on the server and in every browser. */
export function formatDateTime(iso: string, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone, day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).format(new Date(iso))
}

export function formatDate(iso: string, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone, day: 'numeric', month: 'short', year: 'numeric' }).format(new Date(iso))
}

/** A calendar day without a zone: "2027-03-14" → "14 Mar 2027". */
export function formatDay(day: string): string {
  return formatDate(`${day}T12:00:00Z`, 'UTC')
}
