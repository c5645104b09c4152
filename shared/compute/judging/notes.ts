import type { Warning } from '../terms/measurement'

/** Remarks on how figures came about that put no doubt on them. */
const NOTE_CODES: ReadonlySet<string> = new Set(['repeatability-not-measured'])

/**
 * Parts the remarks of a measurement: doubts, to be shown where a verdict is read, and notes, which belong to how it was measured.
 *
 * @param warnings remarks of one measurement.
 */
export function partRemarks(warnings: readonly Warning[]): { doubts: Warning[]; notes: Warning[] } {
  return { doubts: warnings.filter(warning => !NOTE_CODES.has(warning.code)), notes: warnings.filter(warning => NOTE_CODES.has(warning.code)) }
}
