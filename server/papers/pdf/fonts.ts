/** Font files (TTF) that papers are set in. */
export interface PaperFonts {
  sans: Uint8Array
  sansSemiBold: Uint8Array
  mono: Uint8Array
  monoSemiBold: Uint8Array
  /** For signs that the others lack. */
  fallback: Uint8Array
}
