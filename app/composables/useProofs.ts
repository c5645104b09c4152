import type { CheckAnswer } from '#shared/contracts/papers'
import type { PaperRecord, PaperSample } from '#shared/contracts/paper-record'
import type { AnalysisSettings } from '#shared/compute/terms/measurement'
import type { RecomputeJob, RecomputeReply } from '~/workers/recompute'

export interface Proof { state: 'idle' | 'running' | 'holds' | 'fails'; sentence: string; details: string[] }

const idle = (): Proof => ({ state: 'idle', sentence: '', details: [] })
const hex = (buffer: ArrayBuffer) => [...new Uint8Array(buffer)].map(byte => byte.toString(16).padStart(2, '0')).join('')
const sha256 = async (bytes: BufferSource) => hex(await crypto.subtle.digest('SHA-256', bytes))
const bytesOf = (base64: string) => Uint8Array.from(atob(base64), character => character.charCodeAt(0))

/** The three proofs of a certificate, all made in the visitor's browser. */
export function useProofs(answer: CheckAnswer, fileAddress: (sha256: string) => string) {
  const file = ref<Proof>(idle())
  const figures = ref<Proof>(idle())
  const record = ref<Proof>(idle())

  async function checkFile(chosen: File): Promise<void> {
    file.value = { ...idle(), state: 'running', sentence: 'Computing the file’s hash' }
    const bytes = await chosen.arrayBuffer()
    const hash = await sha256(bytes)
    const head = new TextDecoder('latin1').decode(bytes.slice(0, 5))
    if (hash === answer.pdfSha256) file.value = { state: 'holds', sentence: 'This is the file that was issued, byte for byte.', details: [hash] }
    else if (head !== '%PDF-') file.value = { state: 'fails', sentence: `“${chosen.name}” is not a PDF.`, details: [] }
    else if (answer.pdfSha256 === null) file.value = { state: 'fails', sentence: 'The certificate’s file is still being drawn; try again in a minute.', details: [] }
    else file.value = { state: 'fails', sentence: 'This is not the file that was issued: it was altered, cut short, or belongs to another certificate.', details: [`this file: ${hash}`, `issued: ${answer.pdfSha256}`] }
  }

  async function checkRecord(): Promise<void> {
    record.value = { ...idle(), state: 'running', sentence: 'Checking hash, signature and logbook' }
    const text = new TextEncoder().encode(answer.recordText)
    const problems: string[] = []
    const hash = await sha256(text)
    if (hash !== answer.recordSha256) problems.push('The record’s hash differs from the one issued.')
    const der = bytesOf(answer.publicKeyPem.replaceAll(/-----[^-]+-----|\s/g, ''))
    const keyHash = await sha256(der)
    if (keyHash.slice(0, 16) !== answer.keyId) problems.push('The public key is not the one named.')
    const key = await crypto.subtle.importKey('spki', der, { name: 'Ed25519' }, false, ['verify'])
    if (!await crypto.subtle.verify({ name: 'Ed25519' }, key, bytesOf(answer.signature), text)) problems.push('The signature does not belong to this record.')
    for (const entry of answer.logbook) {
      if (await sha256(new TextEncoder().encode(entry.previousHash + entry.contentHash)) !== entry.entryHash) problems.push(`Logbook entry ${entry.sequence} does not fit its digests.`)
    }
    record.value = problems.length === 0
      ? { state: 'holds', sentence: `Record, signature and ${answer.logbook.length} logbook entries fit together.`, details: [`record ${hash}`, `key ${answer.keyId}`] }
      : { state: 'fails', sentence: 'Something was changed.', details: problems }
  }

  async function recompute(): Promise<void> {
    const measured = answer.record.samples.filter(sample => sample.files.length > 0)
    figures.value = { state: 'running', sentence: `0 of ${measured.length} motors recomputed`, details: [] }
    const worker = new Worker(new URL('../workers/recompute.ts', import.meta.url), { type: 'module' })
    const details: string[] = []
    try {
      for (const [index, sample] of measured.entries()) {
        details.push(...await recomputeOne(worker, index, answer.record, sample, fileAddress))
        figures.value = { state: 'running', sentence: `${index + 1} of ${measured.length} motors recomputed`, details }
      }
    }
    finally {
      worker.terminate()
    }
    figures.value = details.length === 0
      ? { state: 'holds', sentence: `All figures and verdicts of ${measured.length} motors follow from their raw files.`, details: [] }
      : { state: 'fails', sentence: 'Not everything follows from the raw files.', details }
  }

  return { file, figures, record, checkFile, checkRecord, recompute }
}

async function recomputeOne(worker: Worker, index: number, record: PaperRecord, sample: PaperSample, fileAddress: (sha256: string) => string): Promise<string[]> {
  const name = `Motor ${sample.serial ?? sample.position}`
  const files: { name: string; bytes: Uint8Array }[] = []
  for (const file of sample.files) {
    const response = await fetch(fileAddress(file.sha256))
    if (!response.ok) return [`${name}: the raw file ${file.name} could not be fetched.`]
    const bytes = new Uint8Array(await response.arrayBuffer())
    if (await sha256(bytes) !== file.sha256) return [`${name}: the raw file ${file.name} is not the one the certificate names.`]
    files.push({ name: file.name, bytes })
  }
  let settings: AnalysisSettings
  try {
    settings = settingsOf(record, sample)
  }
  catch (error) {
    return [`${name}: ${error instanceof Error ? error.message : String(error)}.`]
  }
  const job: RecomputeJob = { index, files, settings, content: JSON.parse(JSON.stringify(record.sheet.content)) }
  const reply = await new Promise<RecomputeReply>((resolve, reject) => {
    worker.onmessage = (event: MessageEvent<RecomputeReply>) => resolve(event.data)
    worker.onerror = event => reject(new Error(event.message))
    worker.postMessage(job)
  })
  return differences(name, sample, reply)
}

/** The same settings that the server analysed with, from the record alone. */
function settingsOf(record: PaperRecord, sample: PaperSample): AnalysisSettings {
  const rig = record.rigs.find(each => each.code === sample.rig && (!sample.calibration || each.calibration.certificateNumber === sample.calibration))
  if (!rig) throw new RangeError(`the certificate does not hold rig ${sample.rig ?? 'not stated'} with its calibration`)
  const content = record.sheet.content
  const orders = content.limits.flatMap(limit => /^order\.(\d+)$/.exec(limit.key)?.[1] ?? []).map(Number).sort((a, b) => a - b)
  return JSON.parse(JSON.stringify({
    method: rig.method, design: record.part.design, ratedTorqueNm: record.part.ratedTorqueNm, highestOrder: content.highestOrder, ordersNamed: [...new Set(orders)], rippleDefinition: content.rippleDefinition,
    compensation: content.compensation, recipe: sample.recipe,
    rig: { ...rig.properties, torqueRelativeUncertainty: rig.calibration.torqueRelativeUncertainty, torqueAbsoluteUncertaintyNm: rig.calibration.torqueAbsoluteUncertaintyNm },
  })) as AnalysisSettings
}

function differences(name: string, sample: PaperSample, reply: RecomputeReply): string[] {
  if (reply.fault) return [`${name}: ${reply.fault}`]
  const found = sample.characteristics.flatMap((stated) => {
    const value = reply.characteristics.find(row => row.key === stated.key)?.value ?? null
    const same = value === stated.value || (value !== null && stated.value !== null && Math.abs(value - stated.value) <= 1e-9 * Math.max(Math.abs(value), Math.abs(stated.value)))
    return same ? [] : [`${name}: ${stated.key} is ${value ?? 'not stated'}, the certificate says ${stated.value ?? 'not stated'}.`]
  })
  return reply.verdict === sample.verdict ? found : [...found, `${name}: the verdict is ${reply.verdict ?? 'open'}, the certificate says ${sample.verdict ?? 'open'}.`]
}
