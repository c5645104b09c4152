import type { Fault } from '../terms/measurement'

/** A result, or the fault for which there is none. */
export type Outcome<T> = { ok: true; value: T } | { ok: false; fault: Fault }

/**
 * A fault of a measurement file, as a value.
 *
 * @param code - kebab-case code of the kind of fault
 * @param line - line of the file, from 1; null when the whole file is meant
 * @param sentence - what is wrong, one sentence
 * @param remedy - what to do, one sentence
 * @returns the failed outcome
 */
export function fail(code: string, line: number | null, sentence: string, remedy: string): { ok: false; fault: Fault } {
  return { ok: false, fault: { code, line, sentence, remedy } }
}

/**
 * Puts the name of the file in front of a fault's sentence, for when several files are one measurement.
 *
 * @param fault - the fault
 * @param name - name of the file
 * @returns the fault with the file named
 */
export function inFile(fault: Fault, name: string): Fault {
  return { ...fault, sentence: `${name}: ${fault.sentence}` }
}
