import { describe, expect, it } from 'vitest'
import { binomialCumulative, hypergeometricCumulative } from '#shared/compute/statistics/discrete'
import { complementaryErrorFunction, normalCumulative } from '#shared/compute/statistics/normal'
import discrete from '../../reference/discrete.json'
import normal from '../../reference/normal.json'

const relativeError = (value: number, truth: number): number =>
  truth === 0 ? Math.abs(value) : Math.abs(value - truth) / Math.abs(truth)

describe('normalCumulative', () => {
  it.each(normal.cases)('gives Φ($z) to 1e-12 relative', ({ z, cumulative }) => {
    expect(relativeError(normalCumulative(z), cumulative)).toBeLessThan(1e-12)
  })

  it('gives 0 and 1 at the infinities', () => {
    expect([normalCumulative(-Infinity), normalCumulative(Infinity)]).toEqual([0, 1])
  })

  it('has no step where the series hands over to the continued fraction', () => {
    const [below, at] = [complementaryErrorFunction(2 - 1e-9), complementaryErrorFunction(2)]
    expect(relativeError(below - at, (2 / Math.sqrt(Math.PI)) * Math.exp(-4) * 1e-9)).toBeLessThan(1e-4)
  })

  it('refuses what is not a number', () => {
    expect(() => normalCumulative(Number.NaN)).toThrow(RangeError)
  })
})

describe('binomialCumulative', () => {
  it.each(discrete.binomial)('gives P(X ≤ $x), n = $n, p = $p to 1e-11 relative', ({ x, n, p, cumulative }) => {
    expect(relativeError(binomialCumulative(x, n, p), cumulative)).toBeLessThan(1e-11)
  })

  it('is certain at the ends: p = 0, p = 1, x below 0 and x = n', () => {
    expect([binomialCumulative(0, 9, 0), binomialCumulative(8, 9, 1), binomialCumulative(-1, 9, 0.5), binomialCumulative(9, 9, 0.5)])
      .toEqual([1, 0, 0, 1])
  })

  it.each([[1, -1, 0.5], [1, 2.5, 0.5], [0.5, 3, 0.5], [1, 3, -0.1], [1, 3, 1.1], [1, 3, Number.NaN]])('refuses x = %s, n = %s, p = %s', (x, n, p) => {
    expect(() => binomialCumulative(x, n, p)).toThrow(RangeError)
  })
})

describe('hypergeometricCumulative', () => {
  it.each(discrete.hypergeometric)('gives P(X ≤ $x), N = $population, D = $marked, n = $n to 1e-11 relative', ({ x, population, marked, n, cumulative }) => {
    expect(relativeError(hypergeometricCumulative(x, population, marked, n), cumulative)).toBeLessThan(1e-11)
  })

  it('is certain when every item is drawn', () => {
    expect([hypergeometricCumulative(2, 10, 3, 10), hypergeometricCumulative(3, 10, 3, 10)]).toEqual([0, 1])
  })

  it.each([[0, 0, 0, 0], [0, 10, 11, 2], [0, 10, 2, 11], [0, 10, -1, 2], [0.5, 10, 2, 2]])('refuses x = %s, N = %s, D = %s, n = %s', (x, population, marked, n) => {
    expect(() => hypergeometricCumulative(x, population, marked, n)).toThrow(RangeError)
  })
})
