import { spawnSync } from 'node:child_process'
import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Page } from 'playwright-core'
import { beforeAll, describe, expect, it } from 'vitest'
import '../support/test-database.ts'
import { projectRoot } from '../../server/project-root.ts'
import { makeGroup, makeMember, PASSWORD, type TestMember } from '../support/people.ts'
import { eventually, type Installation, openWindow, signIn, startInstallation } from './installation.ts'

/** k = 3: Arb 2.23 and PARI/GP 2.15 (reference libraries, not a printed source). */
const DIGITS = '1.030835101793217571955688899796100390925935'

describe('the main job, from a new run to a signed claim that repeats', () => {
  const troubles: string[] = []
  let product: Installation
  let people: Record<'researcher' | 'referee' | 'lead', TestMember>
  let researcher: Page, referee: Page, lead: Page

  beforeAll(async () => {
    product = await startInstallation()
    const group = await makeGroup({ public: true })
    people = {
      researcher: await makeMember({ group, roles: ['researcher'] }),
      referee: await makeMember({ group, roles: ['referee'] }),
      lead: await makeMember({ group, roles: ['lead'] }),
    }
    ;[researcher, referee, lead] = await Promise.all([0, 1, 2].map(() => openWindow(product, troubles)))
    await signIn(researcher, people.researcher.email)
    await signIn(referee, people.referee.email)
    await signIn(lead, people.lead.email)
  })

  it('a researcher has the enclosure computed, with its budget and certificate', async () => {
    await researcher.goto('/runs/new')
    await researcher.getByLabel('Set of integers').selectOption({ label: 'Integers with exactly k prime factors' })
    await researcher.getByLabel('k', { exact: true }).fill('3')
    await researcher.getByLabel('Digits', { exact: true }).fill('40')
    await researcher.getByText('the quickest').waitFor()
    await researcher.locator('.katex').first().waitFor()
    await researcher.getByRole('button', { name: 'Start the run' }).click()
    await researcher.waitForURL(/\/runs\/[0-9a-f-]{36}/)
    await researcher.getByRole('heading', { name: 'Error budget' }).waitFor({ timeout: 60_000 })
    expect(await researcher.getByText(`certified to 4`).first().textContent()).toContain(DIGITS.slice(0, 42))
    await researcher.getByRole('link', { name: 'Download the certificate' }).waitFor()
  })

  it('and drafts a claim from the run, adds evidence, submits it', async () => {
    await researcher.getByLabel('Remark').fill('Forty digits for the table.')
    await researcher.getByRole('button', { name: 'Draft a claim from this run' }).click()
    await researcher.waitForURL(/\/claims\//)
    await researcher.locator('input[type=file]').setInputFiles({ name: 'log of a second program.txt', mimeType: 'text/plain', buffer: Buffer.from('sum up to 10^6 …\n') })
    await researcher.getByRole('button', { name: 'Add evidence' }).click()
    await researcher.getByRole('link', { name: 'log of a second program.txt' }).waitFor()
    await researcher.getByRole('button', { name: 'Submit for review' }).click()
    await researcher.getByRole('heading', { name: 'MST-0001/1' }).waitFor()
  })

  it('the lead asks a referee, whom a mail with a working link reaches', async () => {
    await lead.goto('/desk')
    await lead.getByRole('link', { name: 'Assign a referee' }).click()
    await lead.getByLabel('Referee', { exact: true }).selectOption(people.referee.id)
    await lead.getByRole('button', { name: 'Ask this referee' }).click()
    const mail = await eventually(async () => (await product.mails()).find((one) => one.to.includes(people.referee.email)), 'the mail to the referee')
    const link = /http:\/\/\S+\/claims\/\S+/.exec(mail.text)![0]
    await referee.goto(link)
    await referee.getByRole('button', { name: /^Accept/ }).click()
    await referee.getByRole('heading', { name: 'Your verdict' }).waitFor()
  })

  it('the referee repeats it with the other arithmetic and sees that both meet', async () => {
    await referee.getByLabel('Arithmetic').selectOption('mpfr')
    await referee.getByLabel('Digits', { exact: true }).fill('40')
    await referee.getByRole('button', { name: 'Start the recheck' }).click()
    await referee.getByText(/meets/).first().waitFor({ timeout: 90_000 })
  })

  it('holds digits of a manuscript against it: right ones, and a wrong 31st', async () => {
    const check = (digits: string) => referee.getByLabel('Digits of the manuscript').fill(digits)
    await check(`${DIGITS.slice(0, 42)}…`)
    await referee.getByText('Every digit is confirmed, read as truncated.').waitFor()
    const wrong = `${DIGITS.slice(0, 32)}7${DIGITS.slice(33, 42)}`
    expect(wrong).not.toBe(DIGITS.slice(0, 42))
    await check(wrong)
    await referee.getByText('Wrong at place 31 after the point').waitFor()
  })

  it('and confirms, by which the claim is endorsed and the lead asked to sign', async () => {
    await referee.getByLabel(/^Remark, or the reason/).fill('Repeated with MPFR; both enclosures meet, and the digits agree.')
    await referee.getByRole('button', { name: /^Confirm/ }).click()
    await referee.getByText('endorsed').first().waitFor()
    const mail = await eventually(async () => (await product.mails()).find((one) => one.to.includes(people.lead.email) && /sign/i.test(one.subject)), 'the mail to the lead')
    await lead.goto(/http:\/\/\S+\/claims\/\S+/.exec(mail.text)![0])
  })

  it('the lead signs with the password', async () => {
    await lead.getByRole('button', { name: /^Sign MST-0001\/1/ }).first().click()
    const dialog = lead.getByRole('dialog')
    await dialog.getByLabel(/password/i).fill(PASSWORD)
    await dialog.getByRole('button', { name: /^Sign MST-0001\/1/ }).click()
    await lead.getByText('signed').first().waitFor()
  })

  it('anybody reads it without an account, cites it, downloads the certificate', async () => {
    const reader = await openWindow(product, troubles)
    await reader.goto('/register')
    await reader.getByRole('link', { name: /MST-0001/ }).first().click()
    await reader.waitForURL(/constants\/MST-0001/)
    await reader.goto('/claims/MST-0001-1')
    await reader.getByText(/MST-0001\/1/).first().waitFor()
    expect(await reader.locator('main').innerText()).toMatch(/cite/i)
    const [download] = await Promise.all([reader.waitForEvent('download'), reader.getByRole('link', { name: 'Download the certificate' }).click()])
    await download.saveAs(certificateFile())
    expect(JSON.parse(readFileSync(certificateFile(), 'utf8')).signature.algorithm).toBe('Ed25519')
  })

  it('and repeats it from the file alone; a file changed by one digit is told apart', () => {
    const verify = (file: string) => spawnSync('npm', ['run', '-s', 'verify', '--', file], { cwd: projectRoot, encoding: 'utf8', timeout: 120_000 })
    expect(verify(certificateFile()).status).toBe(0)
    const changed = `${certificateFile()}-changed.json`
    writeFileSync(changed, readFileSync(certificateFile(), 'utf8').replace(DIGITS.slice(0, 40), `${DIGITS.slice(0, 39)}1`))
    const told = verify(changed)
    expect(told.status).toBe(1)
  })

  it('and nothing broke on any page on the way', () => {
    expect(troubles).toEqual([])
  })
})

function certificateFile(): string {
  return join(process.env.DATA_DIR!, 'certificate.json')
}
