import { existsSync } from 'node:fs'
import { createServer } from 'node:http'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { freePort } from '../../server/scripts/cluster.mjs'
import { dataFolder, Installation } from '../support/installation.ts'

const LONG = 150_000
const data = dataFolder()
const started: Installation[] = []
afterAll(async () => {
  await Promise.all(started.map((installation) => installation.end('SIGTERM')))
  data.remove()
}, LONG)

function start(env: Record<string, string>): Installation {
  const installation = new Installation(data.path, env)
  started.push(installation)
  return installation
}

const isReady = async (address: string) => (await fetch(`${address}/health/ready`).catch(() => undefined))?.status === 200
const post = (url: string, body: object) => fetch(url, { method: 'POST', headers: { 'Content-Type': 'application/json', 'X-Merestone': '1' }, body: JSON.stringify(body) })

/* First start, the processes killed one after the other, a second start on the same data, and the end. */
describe('npm start', { timeout: LONG }, () => {
  let port = ''
  const account = () => started[0]!.demoAccount()
  const first = () => started[0]!.ready()

  it('makes everything ready from nothing, and says where and for whom', async () => {
    port = String(await freePort())
    const { address } = await start({ PORT: port }).ready()
    expect(address).toBe(`http://127.0.0.1:${port}`)
    expect((await post(`${address}/api/v1/session`, account())).status).toBe(200)
    const page = await fetch(`${address}/register`, { headers: { Accept: 'text/html' } })
    expect(page.status).toBe(200)
    expect(page.headers.get('content-security-policy')).toContain("script-src 'self'")
    expect(await page.text()).toMatch(/<div id="?root"?>/)
  })

  it('catches the mails that the worker sends', async () => {
    const { address, mail } = await first()
    expect((await post(`${address}/api/v1/password-resets`, { email: account().email })).status).toBe(202)
    const caught = async () => ((await (await fetch(`${mail}/messages.json`)).json()) as { to: string; text: string }[])[0]
    await expect.poll(caught, { timeout: 30_000 }).toMatchObject({ to: expect.stringContaining(account().email), text: expect.stringContaining(`${address}/password-reset/`) })
  })

  it('refuses to run twice on the same data', async () => {
    const second = start({ PORT: String(await freePort()) })
    expect(await second.ended()).toBe(1)
    expect(second.output).toMatch(/running from this folder already \(process \d+\)/)
  })

  it.each(['index.js web', 'index.js worker', 'bin/postgres -D'])('starts %s again when it is killed', async (part) => {
    const { address } = await first()
    await started[0]!.killAndAwaitNext(part)
    await expect.poll(() => isReady(address), { timeout: 30_000 }).toBe(true)
    expect((await post(`${address}/api/v1/session`, account())).status).toBe(200)
  })

  it('leaves no process of its own when it is killed, and goes on from its data at the next start', async () => {
    await started[0]!.end('SIGKILL')
    await expect.poll(() => started[0]!.processes().filter(({ command }) => !command.includes('postgres')), { timeout: 30_000 }).toEqual([])
    const { address } = await start({ PORT: port }).ready()
    expect((await post(`${address}/api/v1/session`, account())).status).toBe(200)
  })

  it('stops everything when it is told to', async () => {
    const last = started.at(-1)!
    expect(await last.end('SIGINT')).toBe(0)
    await expect.poll(() => last.processes(), { timeout: 30_000 }).toEqual([])
    expect(existsSync(join(data.path, 'postgres', 'data', 'postmaster.pid'))).toBe(false)
    expect(existsSync(join(data.path, 'start.lock'))).toBe(false)
  })

  it('says plainly that a port it was given is taken', async () => {
    const taken = createServer().listen(Number(port), '127.0.0.1')
    await new Promise((resolve) => taken.once('listening', resolve))
    const refused = start({ PORT: port })
    expect(await refused.ended()).toBe(1)
    expect(refused.output).toContain(`Port ${port} is taken by another program`)
    await new Promise((resolve) => taken.close(resolve))
  })
})
