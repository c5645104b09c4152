import { describe, expect, it } from 'vitest'
import { AQL_VALUES, codeLetter, INSPECTION_LEVELS, tablePlan } from '#shared/compute/sampling/tables'
import type { InspectionLevel, Severity } from '#shared/compute/terms/judgement'
// Source: MIL-STD-105E (1989), Tables I, II-A, II-B, II-C; see the file for the comparisons made.
import reference from '../../reference/attributes-tables.json'

interface Range extends Record<InspectionLevel, string> { from: number; to: number | null }

describe('codeLetter', () => {
  const ranges = reference.codeLetters as Range[]

  it('gives the printed letter at both ends of every lot size range and at every level (105 cells)', () => {
    let cells = 0
    for (const range of ranges) {
      for (const level of INSPECTION_LEVELS) {
        expect(codeLetter(range.from, level), `${range.from} ${level}`).toBe(range[level])
        expect(codeLetter(range.to ?? 10_000_000, level), `${range.to} ${level}`).toBe(range[level])
        cells++
      }
    }
    expect(cells).toBe(105)
  })

  it('reads a lot of one motor in the first range', () => {
    expect(codeLetter(1, 'II')).toBe('A')
  })

  it.each([0, -1, 2.5, Number.NaN])('refuses a lot size of %s', (lotSize) => {
    expect(() => codeLetter(lotSize, 'II')).toThrow(RangeError)
  })

  it('refuses an unknown level', () => {
    expect(() => codeLetter(100, 'IV' as InspectionLevel)).toThrow(/level must be one of/)
  })
})

describe('tablePlan', () => {
  it('lists the AQLs of the printed tables', () => {
    expect(AQL_VALUES).toEqual(reference.aqlValues)
  })

  it.each(['normal', 'tightened', 'reduced'] as const)('agrees with every cell of the printed %s table, arrows followed', (severity) => {
    let cells = 0
    for (const [letter, row] of Object.entries(reference.tables[severity])) {
      row.split(' ').forEach((cell, column) => {
        const [planLetter, n, ac, re] = cell.split(':')
        const expected = { letter: planLetter, n: Number(n), ac: Number(ac), re: Number(re) }
        expect(tablePlan(severity, letter, AQL_VALUES[column]!), `${severity} ${letter} ${AQL_VALUES[column]}`).toEqual(expected)
        cells++
      })
    }
    expect(cells).toBe(416)
  })

  it.each(['I', 'O', 'S', 'a', ''])('refuses letter "%s"', (letter) => {
    expect(() => tablePlan('normal', letter, '2.5')).toThrow(/letter must be/)
  })

  it.each(['3', '2.50', '', '1.00'])('refuses AQL "%s", which the tables do not print', (aql) => {
    expect(() => tablePlan('normal' as Severity, 'J', aql)).toThrow(/aql must be one of/)
  })
})
