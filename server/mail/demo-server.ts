import { randomUUID } from 'node:crypto'
import { mkdir, readFile, readdir, rm, stat, writeFile } from 'node:fs/promises'
import type { AddressInfo } from 'node:net'
import { join } from 'node:path'
import type { Readable } from 'node:stream'
import { simpleParser } from 'mailparser'
import type { AddressObject, ParsedMail } from 'mailparser'
import { SMTPServer } from 'smtp-server'

/** A message in the list of the demo's mailbox. */
export interface DemoMessage {
  id: string
  receivedAt: string
  from: string
  to: string
  subject: string
  attachments: number
}

/** A message in full. */
export interface DemoMessageContent extends DemoMessage {
  messageId: string
  text: string
  html: string
  files: { name: string; type: string; bytes: Uint8Array }[]
}

export interface DemoMailServer {
  port: number
  /** Newest first. */
  messages: () => DemoMessage[]
  /** One message with its text and attachments; null when there is none. */
  message: (id: string) => Promise<DemoMessageContent | null>
  close: () => Promise<void>
}

/** Older messages are dropped. */
const MOST_MESSAGES = 200
const LARGEST_MESSAGE = 30 * 1024 * 1024

/**
 * A real mail server on this machine's loopback address that delivers nothing: it keeps what it takes, as `.eml` files in a folder and as a list.
 *
 * @param folder where the messages are kept; made when missing, messages of an earlier run are listed again.
 */
export async function startDemoMailServer(folder: string): Promise<DemoMailServer> {
  await mkdir(folder, { recursive: true })
  const list = await readFolder(folder)
  const server = new SMTPServer({
    authOptional: true, disabledCommands: ['AUTH', 'STARTTLS'], size: LARGEST_MESSAGE, disableReverseLookup: true, logger: false,
    onData(stream, session, callback) {
      const to = session.envelope.rcptTo.map(recipient => recipient.address).join(', ')
      keep(folder, list, stream, to).then(() => callback(), callback)
    },
  })
  server.on('error', error => console.error('The demo\'s mail server:', error.message))
  const port = await listen(server)
  return {
    port,
    messages: () => [...list].reverse(),
    async message(id) {
      const found = list.find(message => message.id === id)
      if (!found) return null
      const parsed = await simpleParser(await readFile(join(folder, `${id}.eml`)))
      return {
        ...found, messageId: parsed.messageId ?? '', text: parsed.text ?? '', html: parsed.html || '',
        files: parsed.attachments.map((file, index) => ({ name: file.filename ?? `attachment-${index + 1}`, type: file.contentType, bytes: file.content })),
      }
    },
    close: () => new Promise(resolve => server.close(() => resolve())),
  }
}

function listen(server: SMTPServer): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    const net = server.listen(0, '127.0.0.1', () => resolve((net.address() as AddressInfo).port))
  })
}

async function keep(folder: string, list: DemoMessage[], stream: Readable & { sizeExceeded?: boolean }, to: string): Promise<void> {
  const chunks: Buffer[] = []
  for await (const chunk of stream) {
    // The rest is read and dropped, so that the answer reaches the sender.
    if (!stream.sizeExceeded) chunks.push(chunk as Buffer)
  }
  if (stream.sizeExceeded) throw Object.assign(new Error('The message is larger than 30 MB'), { responseCode: 552 })
  const bytes = Buffer.concat(chunks)
  const receivedAt = new Date()
  const id = `${receivedAt.getTime()}-${randomUUID().slice(0, 8)}`
  await writeFile(join(folder, `${id}.eml`), bytes)
  list.push(summarise(id, await simpleParser(bytes), to))
  for (const dropped of list.splice(0, Math.max(0, list.length - MOST_MESSAGES))) await rm(join(folder, `${dropped.id}.eml`), { force: true })
}

async function readFolder(folder: string): Promise<DemoMessage[]> {
  const ids = (await readdir(folder)).filter(name => /^\d+-[0-9a-f]{8}\.eml$/.test(name)).map(name => name.slice(0, -4)).sort().slice(-MOST_MESSAGES)
  const list: DemoMessage[] = []
  for (const id of ids) {
    if ((await stat(join(folder, `${id}.eml`))).size > LARGEST_MESSAGE) continue
    const parsed = await simpleParser(await readFile(join(folder, `${id}.eml`)))
    list.push(summarise(id, parsed, addressText(parsed.to)))
  }
  return list
}

function summarise(id: string, parsed: ParsedMail, to: string): DemoMessage {
  return { id, receivedAt: new Date(Number(id.split('-')[0])).toISOString(), from: addressText(parsed.from), to, subject: parsed.subject ?? '', attachments: parsed.attachments.length }
}

function addressText(field: AddressObject | AddressObject[] | undefined): string {
  return (Array.isArray(field) ? field : field ? [field] : []).map(each => each.text).join(', ')
}
