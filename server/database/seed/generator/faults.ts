import type { RenderedFile } from './render-file'

/** Ways in which a rig's file goes wrong. */
export type FileFault = 'text-in-a-number' | 'not-a-number' | 'half-a-turn' | 'clipped'

/** A bad file made from a good comma-separated one. */
export function spoil(file: RenderedFile, fault: FileFault): RenderedFile {
  const rows = Buffer.from(file.bytes).toString('utf8').trimEnd().split('\n')
  return { name: file.name, bytes: new Uint8Array(Buffer.from(`${SPOILERS[fault](rows).join('\n')}\n`)) }
}

/** The row with another cell in its third column. */
function withTorque(row: string, cell: string): string {
  return row.replace(/^([^,]*,[^,]*,)[^,]*/, `$1${cell}`)
}

const SPOILERS: Record<FileFault, (rows: string[]) => string[]> = {
  'text-in-a-number': rows => rows.map((row, index) => index === Math.floor(rows.length / 3) ? withTorque(row, '---') : row),
  'not-a-number': rows => rows.map((row, index) => index === Math.floor(rows.length / 2) ? withTorque(row, 'NaN') : row),
  'half-a-turn': rows => rows.filter((row, index) => index === 0 || Number(row.split(',')[1]) < 180),
  'clipped': (rows) => {
    const largest = Math.max(...rows.slice(1).map(row => Number(row.split(',')[2])))
    return rows.map((row, index) => index > 0 && Number(row.split(',')[2]) > 0.55 * largest ? withTorque(row, (0.55 * largest).toFixed(5)) : row)
  },
}
