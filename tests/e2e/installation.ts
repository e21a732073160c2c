import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { join } from 'node:path'
import { type Browser, type BrowserContext, type Page, chromium } from 'playwright-core'
import { afterAll } from 'vitest'
import { ensureClientBuild, ensureServerBuild } from '../../server/scripts/build.mjs'
import { freePort } from '../../server/scripts/cluster.mjs'
import { projectRoot } from '../../server/project-root.ts'
import { PASSWORD } from '../support/people.ts'

/*
 * The product as people meet it: the compiled web process, worker and mail catcher over this test file's database, and Debian's
 * Chromium. Everything listens on loopback and ends with the test file.
 */

const CHROMIUM = '/usr/bin/chromium'
const CHROMIUM_FLAGS = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync']
const build = join(projectRoot, 'dist', 'node', 'server')
const stops: (() => Promise<unknown>)[] = []

afterAll(async () => {
  for (const stop of stops.reverse()) await stop()
})

/** Starts one process and waits for the address that it tells over its IPC channel. */
async function run(args: string[], env: Record<string, string>): Promise<string> {
  const child = spawn(process.execPath, args, { cwd: projectRoot, env: { ...process.env, ...env }, stdio: ['ignore', 'inherit', 'inherit', 'ipc'] })
  stops.push(async () => {
    if (child.exitCode !== null || child.signalCode !== null) return
    const gone = once(child, 'exit')
    child.kill('SIGTERM')
    await gone
  })
  const ready = once(child, 'message').then(([message]) => (message as { address?: string }).address ?? '')
  const ended = once(child, 'exit').then(([code]) => {
    throw new Error(`${args.join(' ')} ended with code ${code}`)
  })
  return Promise.race([ready, ended])
}

export interface Mail {
  to: string
  subject: string
  text: string
}

export interface Installation {
  address: string
  browser: Browser
  /** What the mail catcher has received, the newest first. */
  mails(): Promise<Mail[]>
}

export async function startInstallation(): Promise<Installation> {
  await ensureServerBuild()
  await ensureClientBuild()
  const [port, smtpPort] = [await freePort(), await freePort()]
  const reader = await run([join(build, 'mail', 'catcher', 'main.js'), join(process.env.DATA_DIR!, 'mail'), String(smtpPort), '0'], {})
  const env = { PORT: String(port), PUBLIC_URL: `http://127.0.0.1:${port}`, SMTP_URL: `smtp://127.0.0.1:${smtpPort}`, DATABASE_OWNER_URL: '', NODE_ENV: 'production', LOG_LEVEL: 'error' }
  await Promise.all(['web', 'worker'].map((role) => run([join(build, 'index.js'), role], env)))
  const browser = await chromium.launch({ executablePath: CHROMIUM, args: CHROMIUM_FLAGS })
  stops.push(() => browser.close())
  const mails = async (): Promise<Mail[]> => (await fetch(new URL('/messages.json', reader))).json() as Promise<Mail[]>
  return { address: env.PUBLIC_URL, browser, mails }
}

/** A browser window of its own, watched for anything that goes wrong on the page. */
export async function openWindow({ browser, address }: Installation, troubles: string[]): Promise<Page> {
  const context: BrowserContext = await browser.newContext({ baseURL: address, viewport: { width: 1280, height: 900 }, acceptDownloads: true })
  context.setDefaultTimeout(20_000)
  const page = await context.newPage()
  page.on('pageerror', (error) => troubles.push(`page error: ${error.message}`))
  page.on('response', (response) => response.status() >= 500 && troubles.push(`${response.status()} ${response.url()}`))
  return page
}

export async function signIn(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in')
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password').fill(PASSWORD)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL((url) => url.pathname !== '/sign-in')
}

/** Asks again until the answer is there, as a person does who looks at their mail. */
export async function eventually<T>(ask: () => Promise<T | undefined>, what: string, seconds = 30): Promise<T> {
  for (const end = Date.now() + seconds * 1000; Date.now() < end; await new Promise((resolve) => setTimeout(resolve, 200))) {
    const answer = await ask()
    if (answer !== undefined) return answer
  }
  throw new Error(`waited ${seconds} s in vain for ${what}`)
}
