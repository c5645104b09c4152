/**
 * GS1 check digit of a key: modulo 10, weights 3, 1, 3, … from the rightmost data digit.
 *
 * @param data the key's digits without the check digit, at least one
 * @returns check digit, 0…9
 * @throws RangeError when the text is not made of digits
 * Source: GS1 General Specifications, 7.9.
 */
export function gs1CheckDigit(data: string): number {
  if (!/^\d+$/.test(data)) throw new RangeError(`gs1CheckDigit: data must be digits, got ${JSON.stringify(data)}`)
  let sum = 0
  for (let i = 0; i < data.length; i++) sum += Number(data[data.length - 1 - i]) * (i % 2 === 0 ? 3 : 1)
  return (10 - (sum % 10)) % 10
}

/**
 * Whether the last digit of a GS1 key (GTIN-8, -12, -13, -14, SSCC, GLN) is its check digit.
 *
 * @param key all digits of the key, at least two
 * @returns true when it is
 * @throws RangeError when the text is not made of at least two digits
 */
export function hasValidCheckDigit(key: string): boolean {
  if (key.length < 2) throw new RangeError(`hasValidCheckDigit: key must have at least two digits, got ${JSON.stringify(key)}`)
  return gs1CheckDigit(key.slice(0, -1)) === Number(key.at(-1))
}
