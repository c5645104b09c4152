import { execFileSync } from 'node:child_process'
import { readFileSync, writeFileSync, mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { unzipSync } from 'fflate'
import jsQR from 'jsqr'
import { PNG } from 'pngjs'
import type { Page } from 'playwright-core'
import { describe, expect, inject, it } from 'vitest'
import { expectNoComplaints, signIn, temporaryFolder, useBrowser, visit } from './support/browser'

useBrowser()
const PASSWORD = 'smooth motors turn round'
const INSPECTOR = 'ines@kestrelfold.example'

/** The page's download, as bytes. */
async function download(page: Page, act: () => Promise<void>): Promise<Buffer> {
  const [file] = await Promise.all([page.waitForEvent('download'), act()])
  return readFileSync(await file.path())
}

/** Saves the lot's demo files and gives them to the page's picker, all at once. */
async function uploadDemoFiles(page: Page): Promise<string[]> {
  const zip = unzipSync(new Uint8Array(await download(page, () => page.getByRole('link', { name: /Demo files/ }).click())))
  const folder = temporaryFolder()
  const names = Object.keys(zip).filter(name => !name.endsWith('.md'))
  mkdirSync(folder, { recursive: true })
  for (const name of names) writeFileSync(join(folder, name), zip[name]!)
  await page.getByLabel('Measured on rig').selectOption('TR-1')
  await page.locator('input[aria-label="Map files"]').setInputFiles(names.map(name => join(folder, name)))
  return names
}

/** Text of the QR code on a PDF, read from its pixels by a decoder that shares nothing with the one that wrote it. */
function readCode(pdf: Buffer): string {
  const folder = temporaryFolder()
  writeFileSync(join(folder, 'paper.pdf'), pdf)
  execFileSync('pdftoppm', ['-r', '150', '-png', join(folder, 'paper.pdf'), join(folder, 'page')])
  for (let page = 1; page < 20; page++) {
    let image: PNG
    try {
      image = PNG.sync.read(readFileSync(join(folder, `page-${page}.png`)))
    }
    catch {
      break
    }
    const code = jsQR(new Uint8ClampedArray(image.data), image.width, image.height)
    if (code) return code.data
  }
  throw new Error('no QR code was found on the paper')
}

/** Scans by typing fast and Enter, as a keyboard-wedge scanner does; the field has the focus. */
async function scan(page: Page, text: string): Promise<void> {
  await expect.poll(() => page.evaluate(() => document.activeElement?.id)).toBe('scan')
  await page.keyboard.insertText(text)
  await page.keyboard.press('Enter')
}

describe('the main path', () => {
  it('takes a waiting lot from the scan to an accepted paper that proves itself', async () => {
    const visitor = await visit()
    const { page } = visitor
    await signIn(page, INSPECTOR, PASSWORD)
    await page.waitForURL('**/dock')
    const lot = (await page.locator('h2:has-text("To measure") + ul a p').first().textContent())!.trim()
    await scan(page, lot)
    await page.waitForURL('**/lots/*')
    await expect.poll(() => page.locator('h1').textContent()).toBe(lot)
    await page.getByText('Before you measure').waitFor()
    const names = await uploadDemoFiles(page)
    expect(names.length).toBeGreaterThan(3)
    await page.getByText(/^Measured \d+$/).waitFor({ timeout: 60_000 })
    await page.getByRole('button', { name: 'Sign the acceptance' }).waitFor()

    // A wrong password signs nothing.
    await page.getByRole('button', { name: 'Sign the acceptance' }).click()
    await page.getByLabel('Your password signs it').fill('not my password')
    await page.getByRole('button', { name: 'Sign', exact: true }).click()
    await page.getByText('This is not your password.').waitFor()
    await page.getByLabel('Your password signs it').fill(PASSWORD)
    await page.getByRole('button', { name: 'Sign', exact: true }).click()
    await page.getByText('Accepted', { exact: true }).first().waitFor()

    // Motor page of the first motor.
    await page.locator('ul[aria-label="Drawn motors"] a').first().click()
    await page.waitForURL('**/motors/*')
    await page.getByText('Amplitude by order').first().waitFor()
    const first = page.url()
    await page.keyboard.press('ArrowRight')
    await page.waitForURL(url => url.href !== first)
    await page.getByText('Amplitude by order').first().waitFor()
    await page.goto(first.replace(/\/motors\/.*/, ''))

    const pdf = await download(page, () => page.getByRole('link', { name: /^Certificate P-/ }).click())
    expect(pdf.subarray(0, 5).toString()).toBe('%PDF-')
    const address = readCode(pdf)
    expect(address).toMatch(new RegExp(`^${inject('origin')}/check/[0-9a-f]{32}$`))
    await provePaper(address, pdf)
    // The refused signature and the wrong password are told by the server with an error status, which the console notes.
    visitor.complaints = visitor.complaints.filter(line => !line.includes('403'))
    expectNoComplaints(visitor)
    await visitor.context.close()
  })

  it('receives an unknown delivery from its label, rejects it, and tells the supplier by mail', async () => {
    const visitor = await visit()
    const { page } = visitor
    await signIn(page, INSPECTOR, PASSWORD)
    const card = page.locator('li', { hasText: 'at the gate' }).filter({ has: page.getByRole('button', { name: 'Scan this label' }) }).last()
    const serials = (await download(page, () => card.getByRole('link', { name: /Packing list/ }).click())).toString('utf8')
    await card.getByRole('button', { name: 'Scan this label' }).click()
    await page.waitForURL('**/receive*')
    await expect.poll(() => page.getByLabel('Lot number on the label').inputValue()).toMatch(/^TV-/)
    expect(await page.getByLabel('Quantity, motors').inputValue()).toBe('400')
    await page.getByText(/^Draw \d+ of 400\./).waitFor()
    await page.getByLabel('Serial numbers in the order of the delivery').fill(serials)
    await page.getByRole('button', { name: 'Receive and draw the sample' }).click()
    await page.waitForURL(/\/lots\/\d\d-\d{4}/)
    await page.getByRole('heading', { name: /^TV-/ }).waitFor()
    const lot = (await page.locator('h1').textContent())!.trim()
    await uploadDemoFiles(page)
    await page.getByText(/^Measured \d+$/).waitFor({ timeout: 60_000 })
    await page.getByRole('button', { name: 'Sign the rejection' }).waitFor()
    await page.getByText('Why they fail').waitFor()
    await expect.poll(() => page.locator('section:has-text("Why they fail")').last().textContent()).toContain('rotor side')
    await page.getByRole('button', { name: 'Sign the rejection' }).click()
    await page.getByLabel('Your password signs it').fill(PASSWORD)
    await page.getByRole('button', { name: 'Sign', exact: true }).click()
    await page.getByText('Rejected', { exact: true }).first().waitFor()
    await page.getByRole('link', { name: /^Nonconformance N-/ }).waitFor()
    expectNoComplaints(visitor)
    await visitor.context.close()
    await readMail(lot)
    await actAsSupplier(lot)
  })

  it('says in a sentence of its own what is wrong with a scan', async () => {
    const visitor = await visit()
    const { page } = visitor
    await signIn(page, INSPECTOR, PASSWORD)
    await page.waitForURL('**/dock')
    const cases: [string, RegExp][] = [
      ['nothing-known-77', /Nothing here is called/],
      ['[)>\u001E06\u001DPKF-4412-C\u001DQ0\u001D1TTV-9999-001\u001DVTUVALO\u001E\u0004', /0/],
      ['[)>\u001E06\u001DPKF-0000-X\u001DQ10\u001D1TTV-9999-001\u001DVTUVALO\u001E\u0004', /Part KF-0000-X is not known here/],
      ['[)>\u001E06\u001DPKF-4412-C\u001DQ10\u001D1TTV-9999-001\u001DVNOBODY\u001E\u0004', /No supplier has the code NOBODY/],
    ]
    for (const [text, sentence] of cases) {
      await page.locator('#scan').fill(text)
      await page.locator('#scan').press('Enter')
      await page.getByRole('alert').filter({ hasText: sentence }).waitFor()
    }
    expectNoComplaints(visitor)
    await visitor.context.close()
  })
})

async function provePaper(address: string, pdf: Buffer): Promise<void> {
  const visitor = await visit({ viewport: { width: 390, height: 844 } })
  const { page } = visitor
  await page.goto(address)
  await page.getByText(/is valid: issued/).waitFor()
  const folder = temporaryFolder()
  writeFileSync(join(folder, 'paper.pdf'), pdf)
  await page.getByLabel('choose the PDF').setInputFiles(join(folder, 'paper.pdf'))
  await page.getByText('This is the file that was issued, byte for byte.').waitFor()
  const altered = Buffer.from(pdf)
  altered[altered.length >> 1]! ^= 1
  writeFileSync(join(folder, 'altered.pdf'), altered)
  await page.getByLabel('choose the PDF').setInputFiles(join(folder, 'altered.pdf'))
  await page.getByText(/This is not the file that was issued/).waitFor()
  await page.getByRole('button', { name: 'check', exact: true }).click()
  await page.getByText(/Record, signature and \d+ logbook entries fit together/).waitFor()
  await page.getByRole('button', { name: /recompute \d+ motors/ }).click()
  await page.getByText(/All figures and verdicts of \d+ motors follow from their raw files/).waitFor({ timeout: 60_000 })
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390)
  expectNoComplaints(visitor)

  // A raw file that is swapped on its way to the browser is named.
  await page.route('**/files/*', async (route) => {
    const response = await route.fetch()
    await route.fulfill({ response, body: (await response.text()).replace(/\d(?=\n)/, digit => digit === '1' ? '2' : '1') })
  }, { times: 1 })
  await page.getByRole('button', { name: /recompute \d+ motors/ }).click()
  await page.getByText(/the raw file .* is not the one the certificate names/).waitFor({ timeout: 60_000 })
  await visitor.context.close()
}

async function readMail(lot: string): Promise<void> {
  const visitor = await visit()
  const { page } = visitor
  await page.goto('/mailbox')
  await expect.poll(async () => {
    await page.reload()
    return (await page.locator('main').textContent())!.includes(lot)
  }, { timeout: 60_000, interval: 2000 }).toBe(true)
  await page.getByText(/P-\d{4}-\d{6}\.pdf/).first().waitFor()
  await visitor.context.close()
}

async function actAsSupplier(lot: string): Promise<void> {
  const visitor = await visit()
  const { page } = visitor
  await signIn(page, 'quality@tuvalo.example', PASSWORD)
  await page.waitForURL('**/supplier')
  await page.getByText(lot).first().waitFor()
  expect(await page.locator('main').textContent()).not.toContain('Ambrel')
  // What belongs to another supplier answers exactly as if it did not exist.
  const [foreign, missing] = await Promise.all(['26-0001', '99-9999'].map(number => page.request.get(`/api/lots/${number}`)))
  expect([foreign!.status(), missing!.status()]).toEqual([404, 404])
  await page.getByRole('link', { name: new RegExp(`Please acknowledge.*${lot}`, 's') }).click()
  await page.waitForURL('**/returns/*')
  const results = await download(page, () => page.getByRole('link', { name: 'Results, CSV' }).click())
  expect(results.toString('utf8')).toContain('098-')
  await page.getByRole('button', { name: 'Acknowledge' }).click()
  await page.getByLabel('Containment').fill('Stock and goods in transit were stopped.')
  await page.getByLabel('Cause').fill('A worn fixture let one magnet sit off its place.')
  const number = page.url().split('/').at(-1)
  expect(await (await page.request.get(`/api/nonconformances/${number}`)).json()).toMatchObject({ state: 'acknowledged' })
  await page.getByLabel('Corrective action').fill('The fixture was replaced and is measured weekly.')
  await page.getByRole('button', { name: /^Send (the|your) answer/ }).click()
  await expect.poll(async () => (await (await page.request.get(`/api/nonconformances/${number}`)).json() as { state: string }).state).toBe('answered')
  expectNoComplaints(visitor)
  await visitor.context.close()
}
