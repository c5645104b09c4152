import { createTransport } from 'nodemailer'
import { isSingleAddress } from './address'

/** A mail as it goes to the server. */
export interface MailMessage {
  /** Stable over retries, with its angle brackets. */
  messageId: string
  to: string
  subject: string
  text: string
  html: string
  attachments: { name: string; type: string; bytes: Uint8Array }[]
}

/** Hands mails to a mail server. Resolves when the server has accepted the mail, rejects with an error whose message is fit for people. */
export interface MailTransport {
  send: (message: MailMessage) => Promise<void>
}

export interface MailSettings {
  /** '' means that no mail server is set. */
  host: string
  port: number
  /** TLS from the first byte; otherwise STARTTLS is used when the server offers it. */
  secure: boolean
  user: string
  password: string
  sender: string
}

/** After these the server counts as not answering; a retry follows. */
const TIMEOUTS = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 60_000 } as const

/**
 * A transport over SMTP.
 *
 * @param settings the mail server; with user and password only when it asks for them.
 * @returns a transport; without a host, or with a sender that is no single address, every mail is refused with a sentence that says which setting is missing.
 */
export function createMailTransport(settings: MailSettings): MailTransport {
  if (settings.host === '') return refusing('No mail server is set. Set NUXT_MAIL_HOST and send the notice again.')
  if (!isSingleAddress(settings.sender)) return refusing(`The sender "${settings.sender}" is not one mail address. Correct NUXT_MAIL_SENDER and send the notice again.`)
  const { host, port, secure, user, password } = settings
  const transporter = createTransport({ host, port, secure, auth: user ? { user, pass: password } : undefined, disableFileAccess: true, disableUrlAccess: true, ...TIMEOUTS })
  return {
    async send(message) {
      if (!isSingleAddress(message.to)) throw new Error(`"${message.to}" is not one mail address.`)
      await transporter.sendMail({
        from: settings.sender, to: message.to, messageId: message.messageId, subject: message.subject, text: message.text, html: message.html,
        // Keeps out-of-office answers from coming back (RFC 3834).
        headers: { 'Auto-Submitted': 'auto-generated' },
        attachments: message.attachments.map(file => ({ filename: file.name, contentType: file.type, content: Buffer.from(file.bytes) })),
      }).catch((error: unknown) => { throw new Error(inWords(error, host, port)) })
    },
  }
}

function refusing(sentence: string): MailTransport {
  return { send: () => Promise.reject(new Error(sentence)) }
}

/** What went wrong between us and the mail server, for people. */
function inWords(error: unknown, host: string, port: number): string {
  const { code, response, responseCode, message } = error as { code?: string; response?: string; responseCode?: number; message?: string }
  const said = response ? ` It said: "${response.slice(0, 300)}".` : ''
  const server = `The mail server ${host}:${port}`
  if (code === 'EAUTH') return `${server} does not take our user name and password.${said}`
  if (code === 'EENVELOPE') return `${server} does not take mail for this address.${said}`
  if (code === 'ETIMEDOUT') return `${server} did not answer in time.`
  if (code === 'ECONNECTION' || code === 'ESOCKET' || code === 'EDNS' || code === 'ECONNREFUSED') return `${server} cannot be reached (${message ?? code}).`
  if (responseCode) return `${server} refused the mail.${said}`
  return `${server} could not take the mail (${message ?? 'no reason given'}).`
}
