import type { ColumnRecipe, ColumnRole, Fault, Method, RecipeColumn } from '../terms/measurement'
import { readHead, type TableHead } from './dialect'
import { parseDirection } from './direction'
import { fail, type Outcome } from './fault'
import { readCell } from './scan'
import { parseUnit, unitInHeader, unitNames, unitScale } from './units'

/** What a file's header gives towards a recipe, for a person to confirm. */
export type RecipeGuess =
  | {
      ok: true
      recipe: ColumnRecipe
      /** Header cells of the file, or null. */
      header: string[] | null
      /** First rows as text. */
      sample: string[][]
      /** What keeps the guess from being used as it is; null when nothing does. */
      open: Fault | null
    }
  | { ok: false; fault: Fault }

/** A column as the scanner needs it. */
export interface BoundColumn {
  role: ColumnRole
  index: number
  /** SI value of one unit. */
  scale: number
}

/** Names by which a column is known, one pattern a role, in the order in which they are tried. */
const NAMES: [ColumnRole, RegExp][] = [
  ['direction', /^(?:direction|dir|sense|run|pass|sweep|richtung|drehrichtung)\b/],
  ['torque', /torque|moment\b|drehmoment|\btau\b|τ|cogging|detent|\btrq\b|\bmd\b/],
  ['bus', /\bbus\b|\bv ?bus\b|\bdc ?link\b|supply|zwischenkreis/],
  ['duty', /duty|pwm/],
  ['temperature', /temp/],
  ['speed', /speed|velocity|omega|\brpm\b|drehzahl|ω/],
  ['current', /current|strom|\bi ?q\b|\bi\b|\bamps?\b/],
  ['voltage', /voltage|spannung|\bv ?q\b|\bu\b|\bv\b|\bvolts?\b/],
  ['angle', /angle|angular|position|\bpos\b|\btheta\b|θ|winkel|\bphi\b|φ|encoder|rotor|shaft|\bcounts?\b|\bdeg\b|\brad\b/],
  ['time', /time|\bt\b|\bzeit\b|elapsed|timestamp|seconds/],
]
const SHAFT = /meas|actual|encoder|shaft|\bist\b|real/
const COMMANDED = /command|\bcmd\b|target|set ?point|\bset\b|\bsoll\b|demand|reference|\bref\b/

const NEEDED: Record<Method, ColumnRole[][]> = {
  'torque-sensor': [['angle'], ['torque']],
  hold: [['angle'], ['current', 'voltage', 'duty']],
  spin: [['time'], ['angle']],
}
const USED: Record<Method, ColumnRole[]> = {
  'torque-sensor': ['angle', 'torque', 'time', 'direction', 'temperature'],
  hold: ['angle', 'current', 'voltage', 'duty', 'bus', 'direction', 'temperature'],
  spin: ['time', 'angle', 'speed', 'direction', 'temperature'],
}
const INDEFINITE: Record<ColumnRole, string> = {
  angle: 'an angle', torque: 'a torque', current: 'a current', voltage: 'a voltage', duty: 'a duty', bus: 'a bus voltage', time: 'a time',
  speed: 'a speed', direction: 'a direction', temperature: 'a temperature',
}

/** Header text without its unit, in lower case, words parted by spaces. */
function plainName(header: string): string {
  return header.replace(/[[({][^\])}]*[\])}]/g, ' ').replace(/([a-z])([A-Z])/g, '$1 $2').replace(/[_/.:-]+/g, ' ').trim().toLowerCase()
}

/** Better candidates for the same role win: the shaft's own angle over the commanded one. */
function preference(name: string): number {
  return (SHAFT.test(name) ? 1 : 0) - (COMMANDED.test(name) ? 1 : 0)
}

function guessByHeader(head: TableHead, header: string[]): RecipeColumn[] {
  const best = new Map<ColumnRole, { column: RecipeColumn; rank: number }>()
  header.forEach((cell, index) => {
    const name = plainName(cell)
    const role = NAMES.find(([, pattern]) => pattern.test(name))?.[0]
    if (!role) return
    const words = head.sample.map((row) => row[index] ?? '')
    if (role === 'direction' ? words.some((word) => parseDirection(word) === null) : words.every((word) => readCell(word, head.dialect.decimal).kind === 'text')) return
    const unit = role === 'direction' ? '' : unitInHeader(role, cell) ?? parseUnit(role, head.units?.[index] ?? '')
    const rank = preference(name)
    if (rank > (best.get(role)?.rank ?? -Infinity)) best.set(role, { column: { role, header: cell, index, unit }, rank })
  })
  return [...best.values()].map(({ column }) => column).sort((a, b) => a.index - b.index)
}

/** Without a header: the first numbers are angle and torque, or what the method needs in its usual order; no unit is assumed. */
function guessByPlace(head: TableHead, method: Method): RecipeColumn[] {
  const row = head.sample[0] ?? []
  const columns: RecipeColumn[] = []
  const roles: ColumnRole[] = NEEDED[method].map((choice) => choice[0]!)
  for (let index = 0; index < row.length; index++) {
    const cell = row[index]!
    if (readCell(cell, head.dialect.decimal).kind === 'number') {
      const role = roles.shift()
      if (role) columns.push({ role, header: null, index, unit: null })
    }
    else if (parseDirection(cell) !== null) {
      columns.push({ role: 'direction', header: null, index, unit: '' })
    }
  }
  return columns
}

/** The recipe that a file's head suggests for a method; units that it does not name are null. */
export function guessColumns(head: TableHead, method: Method): ColumnRecipe {
  const columns = head.header ? guessByHeader(head, head.header) : guessByPlace(head, method)
  return { version: 0, columns: columns.filter((column) => USED[method].includes(column.role)) }
}

/** First thing that a recipe lacks for a method: a column, or a unit. */
export function findOpen(recipe: ColumnRecipe, method: Method, line: number | null): Fault | null {
  for (const choice of NEEDED[method]) {
    if (recipe.columns.some((column) => choice.includes(column.role))) continue
    return fail('missing-column', line, `No column was recognised as ${choice.map((role) => INDEFINITE[role]).join(' or ')}.`,
      'Say which column it is in the rig\'s column recipe, or name it in the header.').fault
  }
  const open = recipe.columns.find((column) => column.unit === null)
  if (!open) return null
  const place = open.header === null ? `Column ${open.index + 1}` : `Column "${open.header}"`
  return fail('unit-not-named', line, `${place} holds ${INDEFINITE[open.role]}, but the file does not name its unit.`,
    `Choose the unit in the rig's column recipe: ${unitNames(open.role).join(', ')}.`).fault
}

/**
 * Guesses a column recipe from a file's header and first rows.
 *
 * Roles come from the names in the header (English, German, symbols), units from the header or from a line of units below it.
 * Where a file has both, the angle that the shaft had is taken, not the one commanded. A unit that is not named is null and has to
 * be asked: it is never assumed.
 *
 * @param bytes - the file
 * @param method - how the map was measured
 * @returns the guess with the fault that keeps it from being used as it is (`missing-column`, `unit-not-named`) if any; or the fault
 *   for which nothing can be guessed (`empty-file`, `not-a-table`)
 */
export function guessRecipe(bytes: Uint8Array, method: Method): RecipeGuess {
  const read = readHead(bytes)
  if (!read.ok) return read
  const recipe = guessColumns(read.value, method)
  return { ok: true, recipe, header: read.value.header, sample: read.value.sample, open: findOpen(recipe, method, null) }
}

const sameText = (a: string, b: string) => a.trim().toLowerCase() === b.trim().toLowerCase()

/** Place of a recipe's column in this file; −1 when the file does not have it. */
function findColumn(column: RecipeColumn, head: TableHead): number {
  if (column.header === null) return column.index < head.columnCount ? column.index : -1
  const header = head.header ?? []
  if (header[column.index] !== undefined && sameText(header[column.index]!, column.header)) return column.index
  return header.findIndex((cell) => sameText(cell, column.header!))
}

/**
 * Binds a recipe to a file: finds each column and the size of its unit.
 *
 * @param head - the file's head
 * @param recipe - complete recipe
 * @returns the columns by place, or the fault `missing-column` or `unit-unknown`
 */
export function bindRecipe(head: TableHead, recipe: ColumnRecipe): Outcome<BoundColumn[]> {
  const bound: BoundColumn[] = []
  for (const column of recipe.columns) {
    const index = findColumn(column, head)
    if (index < 0) {
      const name = column.header === null ? `column ${column.index + 1}` : `the column "${column.header}"`
      return fail('missing-column', head.header ? Math.max(1, head.dataLine - 1) : null, `The file does not have ${name}, which the rig's recipe names for ${column.role}.`,
        'Upload a file of the rig\'s usual form, or change the rig\'s column recipe.')
    }
    const unit = column.unit ?? ''
    if (column.role !== 'direction' && parseUnit(column.role, unit) !== unit) {
      return fail('unit-unknown', null, `The recipe's unit "${unit}" is not a unit of ${column.role}.`, `Choose one of: ${unitNames(column.role).join(', ')}.`)
    }
    bound.push({ role: column.role, index, scale: unitScale(column.role, unit) })
  }
  return { ok: true, value: bound }
}
