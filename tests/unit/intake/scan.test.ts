import { describe, expect, it } from 'vitest'
import { CellScanner, readCell } from '#shared/compute/intake/scan'
import { randomSource } from '../torque/support'

function scanOne(text: string, decimal = '.'): number {
  return new CellScanner(new TextEncoder().encode(`${text}\n`), 59, decimal.charCodeAt(0)).number()
}

/** Numbers of every form that a file may hold. */
function randomNumber(uniform: () => number): string {
  const kind = uniform()
  const sign = uniform() < 0.3 ? '-' : uniform() < 0.1 ? '+' : ''
  const value = 10 ** (uniform() * 20 - 10) * uniform()
  if (kind < 0.3) return sign + value.toFixed(Math.floor(uniform() * 12))
  if (kind < 0.5) return sign + value.toString()
  if (kind < 0.7) return sign + value.toExponential(Math.floor(uniform() * 20))
  if (kind < 0.8) return `${sign}${Math.floor(uniform() * 1e9)}.`
  if (kind < 0.9) return `${sign}.${Math.floor(uniform() * 1e9)}`
  return `${sign}${Array.from({ length: 1 + Math.floor(uniform() * 30) }, () => Math.floor(uniform() * 10)).join('')}e${Math.floor(uniform() * 60 - 30)}`
}

describe('CellScanner.number', () => {
  it('equals Number() to the last bit for 100 000 random numbers', () => {
    const { uniform } = randomSource(2024)
    const texts = Array.from({ length: 100_000 }, () => randomNumber(uniform))
    const scanner = new CellScanner(new TextEncoder().encode(`${texts.join(';')}\n`), 59, 46)
    const wrong = texts.filter((text) => !Object.is(scanner.number(), Number(text)))
    expect(wrong).toEqual([])
  })

  it('reads a decimal comma as Number() reads the point', () => {
    const { uniform } = randomSource(9)
    for (let count = 0; count < 2000; count++) {
      const text = randomNumber(uniform)
      expect(scanOne(text.replace('.', ','), ',')).toBe(Number(text))
    }
  })

  it.each(['0', '-0', '+5', '.5', '5.', '1e5', '1E-5', '9007199254740993', '123456789012345', '1234567890123456', '0.1e23', '1e22', '1e23', '4.9e-324', '1.7976931348623157e308'])('reads %s as Number() does', (text) => {
    expect(Object.is(scanOne(text), Number(text))).toBe(true)
  })

  it.each(['', 'abc', '0x10', 'Infinity', 'NaN', '1_000', '1e', '1e+', '--1', '1.2.3', '1 2', '-', '.', 'e5', '1,5', '1e999', '1.5 mNm'])('gives NaN for "%s"', (text) => {
    expect(scanOne(text)).toBeNaN()
  })

  it('reads quoted cells and blanks around cells', () => {
    const scanner = new CellScanner(new TextEncoder().encode(' 1.5 ;"2,5"; "-3" ;\t4\r\n'), 59, 46)
    expect(scanner.number()).toBe(1.5)
    expect(scanner.text()).toBe('2,5')
    expect(scanner.number()).toBe(-3)
    expect(scanner.number()).toBe(4)
    expect(scanner.atLineEnd).toBe(true)
  })
})

describe('readCell', () => {
  it.each([['1.5', 'number'], ['', 'empty'], ['nan', 'not-finite'], ['-Inf', 'not-finite'], ['1e400', 'not-finite'], ['#DIV/0!', 'not-finite'], ['fwd', 'text'], ['0x1F', 'text']] as const)('takes "%s" for %s', (text, kind) => {
    expect(readCell(text, '.').kind).toBe(kind)
  })
})
