import { readFileSync } from 'node:fs'
import type { PaperFonts } from '../../../server/papers/pdf/fonts'

const read = (name: string) => new Uint8Array(readFileSync(new URL(`../../../fonts/${name}`, import.meta.url)))

/** The same faces that the build carries. */
export const FONTS: PaperFonts = {
  sans: read('AtkinsonHyperlegibleNext-Regular.ttf'), sansSemiBold: read('AtkinsonHyperlegibleNext-SemiBold.ttf'), mono: read('AtkinsonHyperlegibleMono-Regular.ttf'), monoSemiBold: read('AtkinsonHyperlegibleMono-SemiBold.ttf'),
  fallback: read('DejaVuSans.ttf'),
}
