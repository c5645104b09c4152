export const GS = '\u001D'
export const RS = '\u001E'
export const EOT = '\u0004'

/**
 * What hand scanners type when they cannot type control characters: names in angle, curly or square brackets, caret
 * notation, control pictures, escapes.
 */
const SUBSTITUTES: readonly [RegExp, string][] = [
  [/<GS>|\{GS\}|\[GS\]|<FNC1>|\{FNC1\}|\u241D|\\x1d|\\u001d|<0x1d>/gi, GS],
  [/<RS>|\{RS\}|\[RS\]|\u241E|\\x1e|\\u001e|<0x1e>/gi, RS],
  [/<EOT>|\{EOT\}|\[EOT\]|\u2404|\\x04|\\u0004|<0x04>/gi, EOT],
]

/** Caret notation is taken for control characters only inside an envelope or where GS1 data cannot hold a caret. */
const CARETS: readonly [RegExp, string][] = [[/\^\]/g, GS], [/\^\^/g, RS], [/\^D/g, EOT]]

/**
 * Puts control characters back where a scanner typed visible substitutes: `<GS>`, `{GS}`, `[GS]`, `^]`, `␝`, `\x1D` and
 * the same for RS (`^^`) and EOT (`^D`).
 *
 * @param text as scanned
 * @returns text with control characters, and whether anything was put back
 */
export function restoreControlCharacters(text: string): { text: string; substituted: boolean } {
  let restored = text
  for (const [pattern, character] of SUBSTITUTES) restored = restored.replace(pattern, character)
  const carets = restored.startsWith('[)>') ? CARETS : CARETS.slice(0, 1)
  for (const [pattern, character] of carets) restored = restored.replace(pattern, character)
  return { text: restored, substituted: restored !== text }
}

/** Control characters made visible for a sentence. */
export function showControlCharacters(text: string): string {
  return text.replaceAll(GS, '\u241D').replaceAll(RS, '\u241E').replaceAll(EOT, '\u2404')
}
