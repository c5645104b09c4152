import type { PaperFonts } from '../papers/pdf/fonts'

/** The faces that papers are set in, from the build. */
export async function loadFonts(): Promise<PaperFonts> {
  const storage = useStorage('assets:fonts')
  const read = async (name: string): Promise<Uint8Array> => {
    const item: unknown = await storage.getItemRaw(name)
    if (!(item instanceof Uint8Array)) throw new Error(`The font ${name} is missing from the build.`)
    return item
  }
  const [sans, sansSemiBold, mono, monoSemiBold, fallback] = await Promise.all(['AtkinsonHyperlegibleNext-Regular.ttf', 'AtkinsonHyperlegibleNext-SemiBold.ttf', 'AtkinsonHyperlegibleMono-Regular.ttf', 'AtkinsonHyperlegibleMono-SemiBold.ttf', 'DejaVuSans.ttf'].map(read))
  return { sans: sans!, sansSemiBold: sansSemiBold!, mono: mono!, monoSemiBold: monoSemiBold!, fallback: fallback! }
}
