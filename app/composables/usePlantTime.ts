/** Times in the plant's zone. */
export function usePlantTime() {
  const session = useSessionStore()
  return {
    dateTime: (iso: string) => formatDateTime(iso, session.timeZone),
    date: (iso: string) => formatDate(iso, session.timeZone),
    day: formatDay,
  }
}
