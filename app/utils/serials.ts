/** Serial numbers of a pasted list: one a line, or separated by spaces, commas or semicolons. */
export const splitSerials = (text: string): string[] => text.split(/[\s,;]+/).filter(serial => serial !== '')

/** The first serial that stands in a list twice; null: none does. */
export function firstRepeated(serials: readonly string[]): string | null {
  const seen = new Set<string>()
  return serials.find(serial => seen.has(serial) || !seen.add(serial)) ?? null
}
