import type { Direction } from '../terms/measurement'

const FORWARD = ['fwd', 'forward', 'forwards', 'f', '+', '+1', '1', '1.0', '+1.0', 'up', 'cw', 'right', 'rising', 'pos', 'positive', 'plus', 'ascending']
const REVERSE = [
  'rev', 'reverse', 'reversed', 'r', '-', '-1', '-1.0', '\u2212', '\u22121', '0', '0.0', 'down', 'ccw', 'acw', 'left', 'falling', 'neg',
  'negative', 'minus', 'bwd', 'backward', 'backwards', 'back', 'b', 'descending',
]

const WORDS = new Map<string, Direction>([
  ...FORWARD.map((word): [string, Direction] => [word, 1]),
  ...REVERSE.map((word): [string, Direction] => [word, -1]),
])

/**
 * Reads a cell of a direction column.
 *
 * The sign is that of the words; which way the angle ran decides later, where both directions are there
 * (clockwise on one bench is anticlockwise on the next).
 *
 * @param text - the cell: fwd/rev, forward/reverse, +1/-1, up/down, cw/ccw, …
 * @returns +1 or −1, or null when the word is not known
 */
export function parseDirection(text: string): Direction | null {
  return WORDS.get(text.trim().replace(/^"|"$/g, '').trim().toLowerCase()) ?? null
}
