import { describe, expect, it } from 'vitest'
import { formatDate, formatDateTime, formatDay } from '~/utils/time'

describe('times for people', () => {
  it('shows an instant in the zone given, whatever the zone of the machine', () => {
    expect(formatDateTime('2026-12-01T23:30:00.000Z', 'Europe/Berlin')).toBe('2 Dec 2026, 00:30')
    expect(formatDateTime('2026-12-01T23:30:00.000Z', 'UTC')).toBe('1 Dec 2026, 23:30')
    expect(formatDate('2026-12-01T23:30:00.000Z', 'Asia/Tokyo')).toBe('2 Dec 2026')
  })

  it('writes midnight as 00:00, not 24:00', () => {
    expect(formatDateTime('2026-12-01T00:00:00.000Z', 'UTC')).toBe('1 Dec 2026, 00:00')
  })

  it('shows summer time on the day on which it begins', () => {
    expect(formatDateTime('2026-03-29T00:59:00.000Z', 'Europe/Berlin')).toBe('29 Mar 2026, 01:59')
    expect(formatDateTime('2026-03-29T01:00:00.000Z', 'Europe/Berlin')).toBe('29 Mar 2026, 03:00')
  })

  it('shows a calendar day as that day everywhere', () => {
    expect(formatDay('2027-03-14')).toBe('14 Mar 2027')
  })
})
