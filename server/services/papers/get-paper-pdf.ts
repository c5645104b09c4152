import type { Services } from '../context'

/** The stored PDF of a paper, byte for byte as first drawn; null when it is not drawn yet. */
export async function getPaperPdf(services: Pick<Services, 'files'>, paper: { number: string; pdfSha256: string | null }): Promise<{ name: string; bytes: Uint8Array; type: 'application/pdf' } | null> {
  if (paper.pdfSha256 === null) return null
  return { name: `${paper.number}.pdf`, bytes: await services.files.get(paper.pdfSha256), type: 'application/pdf' }
}
