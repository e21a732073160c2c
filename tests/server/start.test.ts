import { spawn, type ChildProcess } from 'node:child_process'
import { chmodSync, existsSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { freePort } from '../../server/scripts/cluster.mjs'
import { root } from '../../server/scripts/say.mjs'

/*
 * `npm start` as a person runs it, with a data folder of its own: first start, the processes killed one after the other, a second
 * start on the same data, and the end.
 */
const data = mkdtempSync(join(tmpdir(), 'merestone-start-'))
// PostgreSQL's user must be able to pass through.
chmodSync(data, 0o755)
const LONG = 120_000
const running: Started[] = []
afterAll(async () => {
  await Promise.all(running.map((started) => started.end('SIGTERM')))
  rmSync(data, { recursive: true, force: true })
}, LONG)

class Started {
  output = ''
  readonly child: ChildProcess
  private readonly exit: Promise<number | null>

  constructor(env: Record<string, string>) {
    const { DATABASE_URL: _database, DATABASE_OWNER_URL: _owner, PUBLIC_URL: _public, SESSION_SECRET: _secret, ...rest } = process.env
    this.child = spawn(process.execPath, ['server/scripts/start.mjs'], { cwd: root, env: { ...rest, NODE_ENV: 'production', LOG_LEVEL: 'info', DATA_DIR: data, ...env }, stdio: ['ignore', 'pipe', 'pipe'] })
    for (const stream of [this.child.stdout, this.child.stderr]) stream?.on('data', (chunk) => (this.output += chunk))
    this.exit = new Promise((resolve) => this.child.once('exit', resolve))
    running.push(this)
  }

  /** Addresses of the product and of the caught mail, once it is ready. */
  async ready(): Promise<{ address: string; mail: string }> {
    await Promise.race([expect.poll(() => this.output, { timeout: LONG, interval: 100 }).toContain('Ctrl-C stops it.'), this.exit])
    const [address, mail] = [/is ready: (\S+)/, /caught here: (\S+)/].map((pattern) => pattern.exec(this.output)?.[1])
    if (address === undefined || mail === undefined) throw new Error(`It did not start:\n${this.output}`)
    return { address, mail }
  }

  ended(): Promise<number | null> {
    return this.exit
  }

  async end(signal: 'SIGTERM' | 'SIGINT' | 'SIGKILL'): Promise<number | null> {
    this.child.kill(signal)
    return this.exit
  }
}

/** Command lines of living processes that belong to this data folder. */
function processes(): { pid: number; command: string }[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .flatMap((name) => {
      try {
        const command = readFileSync(`/proc/${name}/cmdline`, 'utf8').replaceAll('\0', ' ')
        const ours = command.includes(data) || readFileSync(`/proc/${name}/environ`, 'utf8').includes(`DATA_DIR=${data}`)
        return ours && command !== '' ? [{ pid: Number(name), command }] : []
      } catch {
        // Ended meanwhile, or another user's.
        return []
      }
    })
}

const killOne = (part: string): void => {
  const found = processes().find(({ command }) => command.includes(part))
  if (!found) throw new Error(`There is no process ${part}`)
  process.kill(found.pid, 'SIGKILL')
}
const isReady = async (address: string) => (await fetch(`${address}/health/ready`).catch(() => undefined))?.status === 200
const post = (url: string, body: object) => fetch(url, { method: 'POST', headers: { 'Content-Type': 'application/json', 'X-Merestone': '1' }, body: JSON.stringify(body) })

describe('npm start', () => {
  let port = ''
  let account = { email: '', password: '' }

  it('makes everything ready from nothing, and says where and for whom', { timeout: LONG }, async () => {
    port = String(await freePort())
    const started = new Started({ PORT: port })
    const { address } = await started.ready()
    expect(address).toBe(`http://127.0.0.1:${port}`)
    account = { password: /password "([^"]+)"/.exec(started.output)?.[1] ?? '', email: /(\S+@\S+)/.exec(started.output)?.[1] ?? '' }
    expect((await post(`${address}/api/v1/session`, account)).status).toBe(200)
    const page = await fetch(`${address}/constants/MST-0001`, { headers: { Accept: 'text/html' } })
    expect(page.status).toBe(200)
    expect(page.headers.get('content-security-policy')).toContain("script-src 'self'")
    expect(await page.text()).toMatch(/<div id="?root"?>/)
  })

  it('catches the mails that the worker sends', { timeout: LONG }, async () => {
    const { address, mail } = await running[0]!.ready()
    expect((await post(`${address}/api/v1/password-resets`, { email: account.email })).status).toBe(202)
    const caught = async () => ((await (await fetch(`${mail}/messages.json`)).json()) as { to: string; text: string }[])[0]
    await expect.poll(caught, { timeout: 30_000 }).toMatchObject({ to: expect.stringContaining(account.email), text: expect.stringContaining(`${address}/password-reset/`) })
  })

  it('refuses to run twice on the same data', { timeout: LONG }, async () => {
    const second = new Started({ PORT: String(await freePort()) })
    expect(await second.ended()).toBe(1)
    expect(second.output).toMatch(/running from this folder already \(process \d+\)/)
  })

  it('starts again whatever is killed: web process, worker, database', { timeout: LONG }, async () => {
    const { address } = await running[0]!.ready()
    for (const part of ['index.js web', 'index.js worker', 'bin/postgres -D']) {
      const before = new Set(processes().map(({ pid }) => pid))
      killOne(part)
      await expect.poll(() => processes().some(({ pid, command }) => command.includes(part) && !before.has(pid)), { timeout: 30_000 }).toBe(true)
      await expect.poll(() => isReady(address), { timeout: 30_000 }).toBe(true)
    }
    expect((await post(`${address}/api/v1/session`, account)).status).toBe(200)
  })

  it('leaves no process of its own when it is killed, and goes on from its data at the next start', { timeout: LONG }, async () => {
    await running[0]!.end('SIGKILL')
    await expect.poll(() => processes().filter(({ command }) => !command.includes('postgres')), { timeout: 30_000 }).toEqual([])
    const { address } = await new Started({ PORT: port }).ready()
    expect((await post(`${address}/api/v1/session`, account)).status).toBe(200)
  })

  it('stops everything when it is told to', { timeout: LONG }, async () => {
    expect(await running.at(-1)!.end('SIGINT')).toBe(0)
    await expect.poll(processes, { timeout: 30_000 }).toEqual([])
    expect(existsSync(join(data, 'postgres', 'data', 'postmaster.pid'))).toBe(false)
    expect(existsSync(join(data, 'start.lock'))).toBe(false)
  })

  it('says plainly that a port it was given is taken', { timeout: LONG }, async () => {
    const taken = await import('node:http').then(({ createServer }) => createServer().listen(Number(port), '127.0.0.1'))
    const refused = new Started({ PORT: port })
    expect(await refused.ended()).toBe(1)
    expect(refused.output).toContain(`Port ${port} is taken by another program`)
    await new Promise((resolve) => taken.close(resolve))
  })
})
