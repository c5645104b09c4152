/** Sum of probabilities over lowest…last by ratios from the mode, normalised by the whole, so that no factorial is needed. */
function cumulativeByRatio(
  lowest: number, highest: number, mode: number, last: number, ratio: (x: number) => number,
): number {
  if (last < lowest) return 0
  if (last >= highest) return 1
  let below = 0
  let above = 0
  const add = (x: number, weight: number): void => {
    if (x <= last) below += weight
    else above += weight
  }
  add(mode, 1)
  for (let x = mode, weight = 1; x < highest && weight > 0; x++) add(x + 1, weight *= ratio(x))
  for (let x = mode, weight = 1; x > lowest && weight > 0; x--) add(x - 1, weight /= ratio(x - 1))
  return below / (below + above)
}

function requireCount(name: string, argument: string, value: number, lowest: number, highest: number): void {
  if (!Number.isInteger(value) || value < lowest || value > highest) {
    throw new RangeError(`${name}: ${argument} must be a whole number from ${lowest} to ${highest}, got ${value}`)
  }
}

/**
 * Binomial distribution function P(X ≤ x) of n trials with chance p.
 *
 * P(X = k+1)/P(X = k) = (n−k)/(k+1) · p/(1−p), summed from the mode outwards and divided by the sum.
 *
 * @param x largest number counted, whole; below 0 gives 0
 * @param n trials, whole, ≥ 0
 * @param p chance, 0…1
 * @returns probability, 0…1, relative error about 1e-13
 * @throws RangeError outside these domains
 * Source: the definition; checked against tests/reference/attributes-sampling.json.
 */
export function binomialCumulative(x: number, n: number, p: number): number {
  requireCount('binomialCumulative', 'n', n, 0, Number.MAX_SAFE_INTEGER)
  if (!Number.isInteger(x)) throw new RangeError(`binomialCumulative: x must be a whole number, got ${x}`)
  if (!(p >= 0 && p <= 1)) throw new RangeError(`binomialCumulative: p must be from 0 to 1, got ${p}`)
  if (x < 0) return 0
  if (p === 0 || x >= n) return 1
  if (p === 1) return 0
  const odds = p / (1 - p)
  const mode = Math.min(n, Math.floor((n + 1) * p))
  return cumulativeByRatio(0, n, mode, x, k => ((n - k) / (k + 1)) * odds)
}

/**
 * Hypergeometric distribution function P(X ≤ x): marked items in a sample drawn without replacement.
 *
 * P(X = k+1)/P(X = k) = (D−k)(n−k) / ((k+1)(N−D−n+k+1)), summed from the mode outwards and divided by the sum.
 *
 * @param x largest number counted, whole; below 0 gives 0
 * @param population N, whole, ≥ 1
 * @param marked D marked items among them, whole, 0…N
 * @param n sample size, whole, 0…N
 * @returns probability, 0…1, relative error about 1e-13
 * @throws RangeError outside these domains
 * Source: the definition; checked against tests/reference/attributes-sampling.json.
 */
export function hypergeometricCumulative(x: number, population: number, marked: number, n: number): number {
  requireCount('hypergeometricCumulative', 'population', population, 1, Number.MAX_SAFE_INTEGER)
  requireCount('hypergeometricCumulative', 'marked', marked, 0, population)
  requireCount('hypergeometricCumulative', 'n', n, 0, population)
  if (!Number.isInteger(x)) throw new RangeError(`hypergeometricCumulative: x must be a whole number, got ${x}`)
  const lowest = Math.max(0, n + marked - population)
  const highest = Math.min(n, marked)
  const mode = Math.min(highest, Math.max(lowest, Math.floor(((n + 1) * (marked + 1)) / (population + 2))))
  const ratio = (k: number): number =>
    ((marked - k) * (n - k)) / ((k + 1) * (population - marked - n + k + 1))
  return cumulativeByRatio(lowest, highest, mode, x, ratio)
}
