import { readFileSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { simpleParser } from 'mailparser'
import { SMTPServer } from 'smtp-server'
import type { AddressInfo } from 'node:net'
import { describe, expect, it, onTestFinished } from 'vitest'
import { people } from '../../server/database/schema/people'
import { papers } from '../../server/database/schema/papers'
import { logbook } from '../../server/database/schema/logbook'
import { nonconformances, notices } from '../../server/database/schema/returns'
import { isSingleAddress } from '../../server/mail/address'
import { startDemoMailServer } from '../../server/mail/demo-server'
import { createMailTransport } from '../../server/mail/transport'
import { resendNotice } from '../../server/services/notices/resend-notice'
import { RETRY, sendNotices } from '../../server/services/notices/send-notices'
import { deadPort, openMailServer, SENDER, transportTo } from './support/mail-server'
import { rejectLot } from './support/rejected-lot'
import { addPerson, addPlant, as, openTestServices } from './support/services'

const PDF = Buffer.from('%PDF-1.7 a certificate for the test')

async function setUp(details: Parameters<typeof rejectLot>[2] = { pdf: PDF }) {
  const test = openTestServices()
  const plant = addPlant(test.services)
  const rejected = await rejectLot(test.services, plant, details)
  const notice = () => test.services.db.select().from(notices).where(eq(notices.nonconformanceId, rejected.id)).all()
  return { ...test, plant, rejected, notice }
}

describe('sendNotices', () => {
  it('sends a rejection once, with the certificate, readable as text and as HTML', async () => {
    const { services, rejected, notice } = await setUp()
    const mail = await openMailServer()
    await sendNotices(services, mail.transport)
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toHaveLength(1)
    expect(notice()).toMatchObject([{ state: 'sent', attempts: 1, lastError: null, sentAt: '2026-12-01T08:00:00.000Z' }])

    const [name] = readdirSync(mail.folder)
    const parsed = await simpleParser(readFileSync(join(mail.folder, name!)))
    expect(parsed.messageId).toBe(notice()[0]!.messageId)
    expect(parsed.from!.text).toBe(SENDER)
    expect(parsed.subject).toBe(`${rejected.number}: lot TV-2611-083 of KF-4412-C rejected, answer by 15 December 2026`)
    expect(parsed.headers.get('auto-submitted')).toBe('auto-generated')
    for (const body of [parsed.text!, parsed.html as string]) {
      expect(body).toContain('71-0004')
      expect(body).toContain('71-0005')
      expect(body).not.toContain('71-0001')
      expect(body).toContain('6.83 mN·m is above the limit 5.40 mN·m by 1.43 mN·m.')
      expect(body).toContain('the stator side')
      expect(body).toContain(`http://localhost:3000/returns/${rejected.number}`)
      expect(body).toContain(`http://localhost:3000/check/${rejected.paper.token}`)
      expect(body).toContain(rejected.paper.number)
    }
    expect(parsed.html).not.toMatch(/<(img|script|style|link)\b/)
    expect(parsed.attachments).toMatchObject([{ filename: `${rejected.paper.number}.pdf`, contentType: 'application/pdf' }])
    expect(parsed.attachments[0]!.content.equals(PDF)).toBe(true)
  })

  it('takes the nonconformance from open to notified when the rejection is sent, and writes it in the logbook', async () => {
    const { services, rejected } = await setUp()
    const state = () => services.db.select().from(nonconformances).where(eq(nonconformances.id, rejected.id)).get()!.state
    expect(state()).toBe('open')
    await sendNotices(services, (await openMailServer()).transport)
    expect(state()).toBe('notified')
    expect(services.db.select().from(logbook).all().map(row => row.action)).toContain('notice.sent')
  })

  it('holds a notice until the PDF of its certificate is stored', async () => {
    const { services, rejected } = await setUp({ pdf: null })
    const mail = await openMailServer()
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toHaveLength(0)
    services.db.update(papers).set({ pdfSha256: await services.files.put(PDF) }).where(eq(papers.id, rejected.paper.id)).run()
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toMatchObject([{ attachments: 1 }])
  })

  it('leaves a certificate of more than 8 MB out, and attaches one of exactly 8 MB', async () => {
    for (const [size, attachments] of [[8 * 1024 * 1024, 1], [8 * 1024 * 1024 + 1, 0]] as const) {
      const { services } = await setUp({ pdf: Buffer.alloc(size) })
      const mail = await openMailServer()
      await sendNotices(services, mail.transport)
      expect(mail.server.messages()).toMatchObject([{ attachments }])
    }
  })

  it('never sends twice when two calls run at the same time', async () => {
    const { services } = await setUp()
    const mail = await openMailServer()
    await Promise.all([sendNotices(services, mail.transport), sendNotices(services, mail.transport), sendNotices(services, mail.transport)])
    expect(mail.server.messages()).toHaveLength(1)
  })

  it('waits a minute, then twice as long each time up to six hours, while the server is down, and sends when it is back', async () => {
    const { services, notice, setTime } = await setUp()
    const down = transportTo(await deadPort())
    const waits: number[] = []
    for (let tries = 1; tries < RETRY.tries; tries++) {
      const before = services.clock().getTime()
      await sendNotices(services, down)
      const [row] = notice()
      expect(row).toMatchObject({ state: 'queued', attempts: tries })
      waits.push((Date.parse(row!.nextAttemptAt) - before) / 60_000)
      setTime(new Date(Date.parse(row!.nextAttemptAt) - 1).toISOString())
      await sendNotices(services, down)
      expect(notice()[0]!.attempts).toBe(tries)
      setTime(row!.nextAttemptAt)
    }
    expect(waits).toEqual([1, 2, 4, 8, 16, 32, 64, 128, 256, 360, 360])
    const mail = await openMailServer()
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toMatchObject([{ to: 'quality@tuvalo.example' }])
    expect(notice()).toMatchObject([{ state: 'sent', attempts: RETRY.tries, lastError: null }])
  })

  it('gives up at the twelfth failed try, keeps the reason in words, and an engineer can send it again', async () => {
    const { services, plant, rejected, notice, setTime, woken } = await setUp()
    const down = transportTo(await deadPort())
    for (let tries = 0; tries < RETRY.tries; tries++) {
      expect(notice()[0]!.state).toBe('queued')
      await sendNotices(services, down)
      setTime(notice()[0]!.nextAttemptAt)
    }
    expect(notice()).toMatchObject([{ state: 'given-up', attempts: RETRY.tries }])
    expect(notice()[0]!.lastError).toMatch(/^The mail server 127\.0\.0\.1:\d+ cannot be reached/)
    const mail = await openMailServer()
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toHaveLength(0)

    services.db.update(people).set({ email: 'new.quality@tuvalo.example' }).where(eq(people.id, plant.contact.personId)).run()
    resendNotice(as(services, plant.engineer), rejected.number, notice()[0]!.id)
    expect(woken).toEqual(expect.arrayContaining(['papers', 'outbox']))
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toMatchObject([{ to: 'new.quality@tuvalo.example' }])
    expect(notice()).toMatchObject([{ state: 'sent', attempts: 1 }])
  })

  it('keeps what a refusing server said', async () => {
    const { services, notice } = await setUp()
    const server = new SMTPServer({ authOptional: true, disabledCommands: ['AUTH', 'STARTTLS'], onRcptTo: (_address, _session, callback) => callback(Object.assign(new Error('no such mailbox here'), { responseCode: 550 })) })
    await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
    onTestFinished(() => new Promise(resolve => server.close(() => resolve())))
    await sendNotices(services, transportTo((server.server.address() as AddressInfo).port))
    expect(notice()[0]!.lastError).toMatch(/does not take mail for this address\. It said: "550 no such mailbox here"/)
  })

  it('says which setting is missing when no mail server is set', async () => {
    const { services, notice } = await setUp()
    await sendNotices(services, createMailTransport({ host: '', port: 587, secure: false, user: '', password: '', sender: SENDER }))
    expect(notice()[0]!.lastError).toContain('NUXT_MAIL_HOST')
  })

  it('sends a notice that was sent already as a new mail with a Message-ID of its own', async () => {
    const { services, plant, rejected, notice } = await setUp()
    const mail = await openMailServer()
    await sendNotices(services, mail.transport)
    resendNotice(as(services, plant.engineer), rejected.number, notice()[0]!.id)
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toHaveLength(2)
    expect(new Set(notice().map(row => row.messageId)).size).toBe(2)
  })
})

describe('addresses', () => {
  it.each(['b@x.example\r\nRCPT TO:<e@evil.example>', 'b@x.example\nBcc: e@evil.example', 'b@x.example, e@evil.example', 'B <b@x.example>', '"b"@x.example', 'b@x.example>', 'b', 'b@', '@x.example', 'b@-x.example', ''])('refuses %j', (address) => {
    expect(isSingleAddress(address)).toBe(false)
  })

  it.each(['b@x.example', 'first.last+tag@sub.x.example', 'ö@x.example', 'o\'neil@x.example'])('takes %j', (address) => {
    expect(isSingleAddress(address)).toBe(true)
  })

  it('gives up at once, and sends to nobody, when an address carries a second recipient', async () => {
    const { services, notice } = await setUp()
    services.db.update(notices).set({ recipientAddress: 'b@x.example\r\nRCPT TO:<e@evil.example>' }).run()
    const mail = await openMailServer()
    await sendNotices(services, mail.transport)
    expect(mail.server.messages()).toHaveLength(0)
    expect(notice()).toMatchObject([{ state: 'given-up', attempts: 1 }])
    expect(notice()[0]!.lastError).toContain('is not one mail address')
  })

  it('the transport refuses such an address by itself', async () => {
    const mail = await openMailServer()
    const message = { messageId: '<a@b>', to: 'b@x.example\r\nRCPT TO:<e@evil.example>', subject: 's', text: 't', html: '<p>t</p>', attachments: [] }
    await expect(mail.transport.send(message)).rejects.toThrow('is not one mail address')
  })

  it('a line break in a subject adds no header', async () => {
    const mail = await openMailServer()
    await mail.transport.send({ messageId: '<a@b>', to: 'b@x.example', subject: 'Hello\r\nBcc: e@evil.example', text: 't', html: '<p>t</p>', attachments: [] })
    const parsed = await simpleParser(readFileSync(join(mail.folder, readdirSync(mail.folder)[0]!)))
    expect(parsed.headers.has('bcc')).toBe(false)
    expect(mail.server.messages()).toMatchObject([{ to: 'b@x.example' }])
  })
})

describe('what a notice says', () => {
  it('escapes names that look like markup', async () => {
    const { services, plant } = await setUp()
    services.db.update(people).set({ name: '<script>alert("x")</script> & Co' }).where(eq(people.id, plant.contact.personId)).run()
    await rejectLot(services, plant, { supplierLot: '<b onclick=\'x\'>', pdf: PDF })
    const row = services.db.select().from(notices).all().at(-1)!
    expect(row.html).toContain('&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt; &amp; Co')
    expect(row.html).not.toMatch(/<script|<b onclick/)
    expect(row.text).toContain('<script>alert("x")</script> & Co')
  })

  it('tells the engineers when the supplier has no first contact, and goes to the contact once there is one', async () => {
    const { services } = openTestServices()
    const plant = addPlant(services)
    services.db.update(people).set({ noticeRank: 2 }).where(eq(people.id, plant.contact.personId)).run()
    const rejected = await rejectLot(services, plant, { pdf: PDF })
    const rows = () => services.db.select().from(notices).where(eq(notices.nonconformanceId, rejected.id)).all()
    expect(rows().map(row => [row.kind, row.recipientAddress])).toEqual([['no-contact', 'engineer@kestrelfold.example'], ['no-contact', 'engineer2@kestrelfold.example']])
    expect(rows()[0]!.text).toContain('Tuvalo Precision Drives has no enabled first contact')

    expect(() => resendNotice(as(services, plant.engineer), rejected.number, rows()[0]!.id)).toThrow('still has no enabled contact')
    expect(rows()).toHaveLength(2)
    addPerson(services, 'supplier', { email: 'first@tuvalo.example', supplierId: plant.supplier.id, noticeRank: 1 })
    resendNotice(as(services, plant.engineer), rejected.number, rows()[0]!.id)
    expect(rows().at(-1)).toMatchObject({ kind: 'rejection', recipientAddress: 'first@tuvalo.example', state: 'queued', paperId: rejected.paper.id })
    expect(() => resendNotice(as(services, plant.engineer), rejected.number, rows()[1]!.id)).toThrow('has a notice already')
  })
})

describe('the demo\'s mail server', () => {
  it('lists messages newest first, opens them, and still has them after a restart', async () => {
    const mail = await openMailServer()
    for (const subject of ['first', 'second']) {
      await mail.transport.send({ messageId: `<${subject}@x.example>`, to: 'b@x.example', subject, text: `text of ${subject}`, html: `<p>${subject}</p>`, attachments: [{ name: 'a.pdf', type: 'application/pdf', bytes: PDF }] })
    }
    expect(mail.server.messages().map(message => message.subject)).toEqual(['second', 'first'])
    const again = await startDemoMailServer(mail.folder)
    onTestFinished(() => again.close())
    expect(again.messages().map(message => message.subject).sort()).toEqual(['first', 'second'])
    const message = await again.message(again.messages().find(each => each.subject === 'first')!.id)
    expect(message).toMatchObject({ messageId: '<first@x.example>', from: SENDER, to: 'b@x.example', text: 'text of first', html: '<p>first</p>' })
    expect(Buffer.from(message!.files[0]!.bytes).equals(PDF)).toBe(true)
    expect(await again.message('../../etc/passwd')).toBeNull()
  })
})
