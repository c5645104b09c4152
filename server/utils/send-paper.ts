import type { H3Event } from 'h3'
import type { papers } from '../database/schema/papers'
import { DomainError } from '../services/domain-error'
import type { Services } from '../services/context'
import { drawPaper } from '../services/papers/draw-papers'
import { getPaperPdf } from '../services/papers/get-paper-pdf'
import { loadFonts } from './fonts'
import { sendFile } from './send-file'

/** The paper's stored PDF; one that was not drawn yet is drawn and stored now, once. */
export async function sendPaperPdf(event: H3Event, services: Services, paper: typeof papers.$inferSelect): Promise<Uint8Array> {
  const stored = await getPaperPdf(services, paper)
  if (stored) return sendFile(event, stored)
  const pdfSha256 = await drawPaper(services, await loadFonts(), paper.id)
  const drawn = await getPaperPdf(services, { ...paper, pdfSha256 })
  if (!drawn) throw new DomainError('internal', 'The certificate could not be drawn just now. Its record is safe; try again.')
  return sendFile(event, drawn)
}
