import type { InspectionLevel, Severity } from '../terms/judgement'

/** The AQLs of the tables, as printed, percent nonconforming (or, above 10, nonconformities per 100 items only). */
export const AQL_VALUES = [
  '0.010', '0.015', '0.025', '0.040', '0.065', '0.10', '0.15', '0.25', '0.40', '0.65', '1.0', '1.5', '2.5',
  '4.0', '6.5', '10', '15', '25', '40', '65', '100', '150', '250', '400', '650', '1000',
] as const

/** Largest AQL that may be read as percent nonconforming items; the larger ones count nonconformities per 100 items. */
export const LARGEST_AQL_OF_NONCONFORMING_ITEMS = 10

/** Code letters of the rows, smallest sample first (I and O are not used). S exists for one tightened plan only. */
export const CODE_LETTERS = [...'ABCDEFGHJKLMNPQRS'] as readonly string[]

const LAST_ORDINARY_ROW = CODE_LETTERS.indexOf('R')

/** Sample sizes of rows A…S of the normal and tightened tables. */
const SAMPLE_SIZES = [2, 3, 5, 8, 13, 20, 32, 50, 80, 125, 200, 315, 500, 800, 1250, 2000, 3150]
/** Sample sizes of rows A…R of the reduced table. */
const REDUCED_SAMPLE_SIZES = [2, 2, 2, 3, 5, 8, 13, 20, 32, 50, 80, 125, 200, 315, 500, 800]

/** Lot size ranges by their last size, with the letters of levels S-1, S-2, S-3, S-4, I, II, III. */
const LETTERS_BY_LOT_SIZE: readonly [last: number, letters: string][] = [
  [8, 'AAAAAAB'], [15, 'AAAAABC'], [25, 'AABBBCD'], [50, 'ABBCCDE'], [90, 'BBCCCEF'], [150, 'BBCDDFG'],
  [280, 'BCDEEGH'], [500, 'BCDEFHJ'], [1200, 'CCEFGJK'], [3200, 'CDEGHKL'], [10000, 'CDFGJLM'],
  [35000, 'CDFHKMN'], [150000, 'DEGJLNP'], [500000, 'DEGJMPQ'], [Infinity, 'DEHKNQR'],
]

/** Last lot size of each range of the code letter table; the last range is open. */
export const LOT_SIZE_RANGE_ENDS: readonly number[] = LETTERS_BY_LOT_SIZE.map(([last]) => last)

export const INSPECTION_LEVELS: readonly InspectionLevel[] = ['S-1', 'S-2', 'S-3', 'S-4', 'I', 'II', 'III']

/** A cell of a table with its arrow followed. */
export interface TablePlan {
  /** Letter of the row in which the plan stands, after following the arrow. */
  letter: string
  /** Sample size of the table; may exceed the lot. */
  n: number
  ac: number
  re: number
}

type Numbers = readonly [ac: number, re: number]
type Cell = Numbers | 'up' | 'down'

/*
 * n · AQL is constant along a diagonal of the tables, and so is the plan: with the row counted from A = 0 and the
 * AQL column from 0.010 = 0, the sum of both names the cell. What departs from the diagonals stands in `cellAt`.
 */
const NORMAL_DIAGONALS: Readonly<Record<number, Numbers>> = {
  14: [0, 1], 17: [1, 2], 18: [2, 3], 19: [3, 4], 20: [5, 6], 21: [7, 8], 22: [10, 11], 23: [14, 15], 24: [21, 22],
  25: [30, 31], 26: [44, 45],
}
const TIGHTENED_DIAGONALS: Readonly<Record<number, Numbers>> = {
  15: [0, 1], 18: [1, 2], 19: [2, 3], 20: [3, 4], 21: [5, 6], 22: [8, 9], 23: [12, 13], 24: [18, 19],
  25: [27, 28], 26: [41, 42],
}
const REDUCED_DIAGONALS: Readonly<Record<number, Numbers>> = {
  14: [0, 1], 17: [0, 2], 18: [1, 3], 19: [1, 4], 20: [2, 5], 21: [3, 6], 22: [5, 8], 23: [7, 10], 24: [10, 13],
  25: [14, 17], 26: [21, 24], 27: [30, 31],
}
/** Row B of the reduced table keeps its two items, so that its numbers differ from the diagonals'. */
const REDUCED_ROW_B: Readonly<Record<number, Numbers>> = {
  14: [0, 1], 17: [0, 2], 18: [1, 3], 19: [2, 4], 20: [3, 5], 21: [5, 6], 22: [7, 8], 23: [10, 11], 24: [14, 15],
  25: [21, 22], 26: [30, 31],
}

/** First AQL column (150, 250, 1000) in which the diagonals 25, 26 and 27 hold a plan instead of an arrow up. */
const FIRST_COLUMN: Readonly<Record<number, number>> = { 25: 21, 26: 22, 27: 25 }

function diagonalsOf(severity: Severity, row: number): Readonly<Record<number, Numbers>> {
  if (severity === 'tightened') return TIGHTENED_DIAGONALS
  if (severity === 'normal' || row === 0) return NORMAL_DIAGONALS
  return row === 1 ? REDUCED_ROW_B : REDUCED_DIAGONALS
}

function cellAt(severity: Severity, row: number, column: number): Cell {
  const diagonal = row + column
  const firstPlan = severity === 'tightened' ? 15 : 14
  const firstAfterGap = severity === 'tightened' ? 18 : 17
  if (row > LAST_ORDINARY_ROW) return severity === 'tightened' && diagonal === 18 ? [1, 2] : 'up'
  // Two items cannot carry the tightened zero plan of AQL 10, and no row stands above A.
  if (row === 0 && diagonal === 15) return 'down'
  const numbers = diagonalsOf(severity, row)[diagonal]
  if (numbers && column >= (FIRST_COLUMN[diagonal] ?? 0)) return numbers
  if (diagonal < firstPlan) return 'down'
  if (diagonal < firstAfterGap) return severity !== 'tightened' && diagonal === 15 ? 'up' : 'down'
  return 'up'
}

/** A chain of arrows down that leaves the table turns to the first plan above. */
function followArrow(severity: Severity, row: number, column: number): [row: number, numbers: Numbers] {
  const start = cellAt(severity, row, column)
  if (typeof start !== 'string') return [row, start]
  for (const step of start === 'down' ? [1, -1] : [-1, 1]) {
    for (let at = row + step; at >= 0 && at < CODE_LETTERS.length; at += step) {
      const cell = cellAt(severity, at, column)
      if (typeof cell !== 'string') return [at, cell]
    }
  }
  throw new RangeError(`tablePlan: no ${severity} plan in row ${row}, column ${column}`)
}

/**
 * Sample size code letter for a lot size and an inspection level.
 *
 * @param lotSize items in the lot, whole, ≥ 1 (a lot of one is read in the first range, 2 to 8)
 * @param level inspection level
 * @returns code letter A…R
 * @throws RangeError when the lot size is not a whole number ≥ 1 or the level is unknown
 * Source: MIL-STD-105E (1989), Table I; the same as ISO 2859-1, Table 1.
 */
export function codeLetter(lotSize: number, level: InspectionLevel): string {
  if (!Number.isInteger(lotSize) || lotSize < 1) {
    throw new RangeError(`codeLetter: lotSize must be a whole number ≥ 1, got ${lotSize}`)
  }
  const column = INSPECTION_LEVELS.indexOf(level)
  if (column < 0) throw new RangeError(`codeLetter: level must be one of ${INSPECTION_LEVELS.join(', ')}, got ${level}`)
  const row = LETTERS_BY_LOT_SIZE.find(([last]) => lotSize <= last)!
  return row[1][column]!
}

/**
 * Single sampling plan of a table cell, arrows followed.
 *
 * @param severity which of the three tables
 * @param letter code letter A…R
 * @param aql acceptable quality limit as printed in the table ("2.5")
 * @returns sample size, acceptance and rejection number and the letter in whose row they stand
 * @throws RangeError for a letter or an AQL that the tables do not hold
 * Source: MIL-STD-105E (1989), Tables II-A, II-B, II-C (public domain); normal and tightened are those of
 * ISO 2859-1, Tables 2-A and 2-B; reduced is 105E's, with its gap between acceptance and rejection number.
 */
export function tablePlan(severity: Severity, letter: string, aql: string): TablePlan {
  const row = CODE_LETTERS.indexOf(letter)
  if (row < 0 || row > LAST_ORDINARY_ROW) throw new RangeError(`tablePlan: letter must be A to R without I and O, got ${letter}`)
  const column = (AQL_VALUES as readonly string[]).indexOf(aql)
  if (column < 0) throw new RangeError(`tablePlan: aql must be one of ${AQL_VALUES.join(', ')}, got ${aql}`)
  const [planRow, [ac, re]] = followArrow(severity, row, column)
  const sizes = severity === 'reduced' ? REDUCED_SAMPLE_SIZES : SAMPLE_SIZES
  return { letter: CODE_LETTERS[planRow]!, n: sizes[planRow]!, ac, re }
}
