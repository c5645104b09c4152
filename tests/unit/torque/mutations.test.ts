import { describe, expect, it } from 'vitest'
import { analyse } from '#shared/compute/torque/analyse'
import { bench, benchRows, bytesOf, randomSource, settingsWith } from './support'

/** Every number of a result, by its path. */
function numbersOf(value: unknown, path = ''): [string, number][] {
  if (typeof value === 'number') return [[path, value]]
  if (value === null || typeof value !== 'object') return []
  return Object.entries(value).flatMap(([key, entry]) => numbersOf(entry, `${path}.${key}`))
}

function expectSound(bytes: Uint8Array, hint: string): boolean {
  const outcome = analyse([{ name: 'm.csv', bytes }], settingsWith({ compensation: { entries: 256, stepNm: 1e-4 } }))
  if (!outcome.ok) {
    expect(outcome.fault.code, hint).toMatch(/^[a-z-]+$/)
    expect(outcome.fault.sentence, hint).toMatch(/\.$/)
    expect(outcome.fault.remedy, hint).toMatch(/\.$/)
    expect(outcome.fault.sentence, hint).not.toMatch(/undefined|NaN(?!")|Infinity(?!")/)
    return false
  }
  const bad = numbersOf(outcome.result).filter(([, value]) => !Number.isFinite(value))
  expect(bad, hint).toEqual([])
  return true
}

const SNIPPETS = ['', ',', ';', '\n', '\r', '"', '#', '-', '.', 'e', '1e308', '-1e308', 'NaN', '0', ' ', '\t', 'fwd', 'rev', '9999999999999999999999', '\u0000', 'µ', '5e-324', '12.5', '-3.25', '1.5e2', '0.001', '7', '1']

describe('analyse on mutated files', () => {
  const rows = benchRows({ samples: 700, noiseMilliNm: 0.05 })
  const { uniform } = randomSource(4711)
  const pick = (count: number) => Math.floor(uniform() * count)

  it('gives figures or a fault, never NaN and never an exception, for 300 files with bytes changed', () => {
    const sound = bytesOf(rows)
    for (let file = 0; file < 300; file++) {
      const bytes = sound.slice()
      for (let change = 0; change <= pick(6); change++) bytes[pick(file % 3 === 0 ? 60 : bytes.length)] = pick(256)
      expectSound(bytes, `file ${file}`)
    }
  })

  it('the same for 300 files with cells, rows and pieces changed', () => {
    let figures = 0
    for (let file = 0; file < 300; file++) {
      const changed = rows.slice()
      for (let change = 0; change <= pick(3); change++) {
        const at = pick(changed.length)
        const cells = changed[at]!.split(',')
        cells[pick(cells.length)] = SNIPPETS[pick(SNIPPETS.length)]!
        if (uniform() < 0.2) changed.splice(at, file % 2 === 0 ? 1 : pick(200))
        else if (uniform() < 0.1) changed.splice(at, 0, ...changed.slice(0, pick(300)))
        else changed[at] = cells.join(',')
      }
      if (expectSound(bytesOf(uniform() < 0.1 ? changed.slice(0, pick(changed.length)) : changed), `file ${file}`)) figures++
    }
    expect(figures).toBeGreaterThan(20)
  })

  it.each([
    ['constant zero with one spike', (row: number) => (row === 500 ? 1 : 0)], ['a step', (row: number) => (row < 500 ? 0 : 1)], ['a ramp', (row: number) => row], ['alternating', (row: number) => row % 2],
    ['huge values', (row: number) => 1e5 * Math.sin(row)], ['tiny values', (row: number) => 1e-300 * Math.sin(row / 3)],
  ])('the same for torque that is %s', (_, torque) => {
    expectSound(bench({ samples: 700, noiseMilliNm: 0, distort: (_torque, row) => torque(row) }), 'shape')
  })

  it('the same for short files of one row to thirty', () => {
    for (let count = 1; count <= 30; count++) expectSound(bytesOf(rows.slice(0, count + 1)), `${count} rows`)
  })
})
