import { fail, inFile } from '../intake/fault'
import { readTable, type MeasurementTable } from '../intake/read-table'
import type { AnalysisSettings, ColumnRecipe, Fault } from '../terms/measurement'

/** A file to be analysed. */
export interface MeasurementFile {
  name: string
  bytes: Uint8Array
}

/** Readings of one motor, of all its files, in the order of files and rows. */
export interface Readings {
  rows: number
  angleRad: Float64Array
  torqueNm: Float64Array
  /** Time within its file, s; null when a file has none. */
  timeS: Float64Array | null
  /** Direction by a column; null when the files have none. */
  direction: Int8Array | null
  lines: Uint32Array
  /** First row of each file, and the number of rows behind the last. */
  starts: number[]
  names: string[]
}

export type ReadingsOutcome =
  | { ok: true; readings: Readings; recipe: ColumnRecipe }
  | { ok: false; fault: Fault; recipe?: ColumnRecipe }

/** Beyond these a column is taken for something else than what the recipe says. */
const MOST_ANGLE_RAD = 1e9
const MOST_TORQUE_NM = 1e6

/**
 * The fault at a row, with its line, and its file named when there are several.
 *
 * @param readings - all readings
 * @param row - row among all readings; null when no row is meant
 */
export function faultAt(readings: Readings, row: number | null, code: string, sentence: string, remedy: string): Fault {
  const { fault } = fail(code, row === null ? null : readings.lines[row]!, sentence, remedy)
  if (row === null || readings.names.length < 2) return fault
  let file = 0
  while (readings.starts[file + 1]! <= row) file++
  return inFile(fault, readings.names[file]!)
}

function join<T extends Float64Array | Uint32Array | Int8Array>(parts: T[], into: T): T {
  let at = 0
  for (const part of parts) {
    into.set(part, at)
    at += part.length
  }
  return into
}

function joinTables(tables: MeasurementTable[], names: string[]): Readings {
  const starts = [0]
  for (const table of tables) starts.push(starts.at(-1)! + table.rows)
  const rows = starts.at(-1)!
  const single = tables.length === 1
  const column = (role: 'angle' | 'torque' | 'time') => {
    const parts = tables.map((table) => table.columns[role]!)
    return single ? parts[0]! : join(parts, new Float64Array(rows))
  }
  return {
    rows, names, starts,
    angleRad: column('angle'),
    torqueNm: column('torque'),
    timeS: tables.every((table) => table.columns.time) ? column('time') : null,
    direction: tables.every((table) => table.direction) ? (single ? tables[0]!.direction : join(tables.map((table) => table.direction!), new Int8Array(rows))) : null,
    lines: single ? tables[0]!.lines : join(tables.map((table) => table.lines), new Uint32Array(rows)),
  }
}

/** Sizes that no small motor has, torque beyond the rig's range, time that runs backwards. */
function findImpossible(readings: Readings, rangeNm: number | null): Fault | null {
  const { angleRad, torqueNm, timeS } = readings
  const most = Math.min(rangeNm ?? MOST_TORQUE_NM, MOST_TORQUE_NM)
  for (let row = 0; row < readings.rows; row++) {
    if (Math.abs(torqueNm[row]!) > most) {
      return faultAt(readings, row, 'beyond-range', `The torque of ${(torqueNm[row]! * 1e3).toPrecision(4)} mN·m is beyond ${rangeNm === null ? 'what any small motor has' : `the rig's range of ${(most * 1e3).toPrecision(4)} mN·m`}.`,
        'Check the unit of the torque column, or measure on a rig with a wider range.')
    }
    if (Math.abs(angleRad[row]!) > MOST_ANGLE_RAD) {
      return faultAt(readings, row, 'angle-too-large', `The angle is ${(angleRad[row]! / 2 / Math.PI).toPrecision(3)} turns.`, 'Check which column is the angle, and its unit.')
    }
  }
  if (!timeS) return null
  for (let file = 0; file < readings.names.length; file++) {
    for (let row = readings.starts[file]! + 1; row < readings.starts[file + 1]!; row++) {
      if (timeS[row]! < timeS[row - 1]!) {
        return faultAt(readings, row, 'time-backwards', 'The time runs backwards here.', 'Check that the file is one measurement in its order, and export it again.')
      }
    }
  }
  return null
}

/**
 * Reads the files of one motor and joins them.
 *
 * @param files - one file or more
 * @param settings - recipe, method and rig
 * @returns all readings and the recipe used; or the fault with its file named when there are several
 */
export function readFiles(files: MeasurementFile[], settings: AnalysisSettings): ReadingsOutcome {
  const tables: MeasurementTable[] = []
  let recipe = settings.recipe
  for (const file of files) {
    const read = readTable(file.bytes, recipe, settings.method)
    if (!read.ok) return files.length > 1 ? { ...read, fault: inFile(read.fault, file.name) } : read
    recipe = read.recipe
    tables.push(read.table)
  }
  const readings = joinTables(tables, files.map((file) => file.name))
  const fault = findImpossible(readings, settings.rig?.rangeNm ?? null)
  return fault ? { ok: false, fault, recipe: recipe! } : { ok: true, readings, recipe: recipe! }
}
