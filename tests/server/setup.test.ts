import { spawn, type ChildProcess } from 'node:child_process'
import { chmodSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { createServer, type AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { dirname, join, relative } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import pg from 'pg'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { freePort, isFree, runningPort } from '../../server/scripts/cluster.mjs'
import { startLocalCluster } from '../../server/scripts/local-cluster.mjs'
import { tryLock, unlock, withLock } from '../../server/scripts/lock.mjs'
import { isAlive, ownName, startOfProcess } from '../../server/scripts/process-id.mjs'
import { root } from '../../server/scripts/say.mjs'
import { stampOf } from '../../server/scripts/stamp.mjs'

const folder = mkdtempSync(join(tmpdir(), 'merestone-setup-'))
// PostgreSQL's user must be able to pass through.
chmodSync(folder, 0o755)
afterAll(() => rmSync(folder, { recursive: true, force: true }))

/** A process that does nothing until it is killed. */
const sleeper = (): ChildProcess => spawn(process.execPath, ['-e', 'setInterval(() => {}, 1000)'], { stdio: 'ignore' })

describe('a process by its name', () => {
  it('is alive while it lives, and the number alone does not count', () => {
    expect(isAlive(ownName())).toBe(true)
    expect(isAlive(`${process.pid} 12`)).toBe(false)
    expect(isAlive('')).toBe(false)
    expect(startOfProcess(2 ** 22 + 1)).toBeUndefined()
  })

  it('is dead as a zombie, which process.kill takes for alive', async () => {
    // The shell starts a child that ends soon, and turns into a program that never asks for it.
    const parent = spawn('sh', ['-c', 'sleep 0.5 & echo $!; exec sleep 30'], { stdio: ['ignore', 'pipe', 'ignore'] })
    const pid = Number(await new Promise<string>((resolve) => parent.stdout.once('data', (chunk) => resolve(String(chunk)))))
    await expect.poll(() => (existsSync(`/proc/${pid}/stat`) ? readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ')[1]?.[0] : 'gone'), { timeout: 10_000 }).toBe('Z')
    expect(() => process.kill(pid, 0)).not.toThrow()
    expect(startOfProcess(pid)).toBeUndefined()
    parent.kill('SIGKILL')
  })
})

describe('a lock', () => {
  const lock = join(folder, 'locks', 'a.lock')
  afterEach(() => rmSync(lock, { force: true }))

  it('is held by one at a time', async () => {
    let inside = 0
    let most = 0
    const work = async () => {
      inside += 1
      most = Math.max(most, inside)
      await pause(20)
      inside -= 1
    }
    await Promise.all([1, 2, 3].map(() => withLock(lock, work)))
    expect(most).toBe(1)
    expect(existsSync(lock)).toBe(false)
  })

  it('is let go when the work fails', async () => {
    await expect(withLock(lock, () => Promise.reject(new Error('broken')))).rejects.toThrow('broken')
    expect(tryLock(lock)).toBeUndefined()
  })

  it('of a living process is respected, of a killed one taken over', async () => {
    const holder = sleeper()
    await expect.poll(() => startOfProcess(holder.pid!)).toBeDefined()
    const name = `${holder.pid} ${startOfProcess(holder.pid!)}`
    mkdirSync(join(folder, 'locks'), { recursive: true })
    writeFileSync(lock, name)
    expect(tryLock(lock)).toBe(name)
    const ended = new Promise((resolve) => holder.once('exit', resolve))
    holder.kill('SIGKILL')
    await ended
    expect(tryLock(lock)).toBeUndefined()
    expect(readFileSync(lock, 'utf8')).toBe(ownName())
  })

  it('is not let go by one who does not hold it', () => {
    writeFileSync(lock, '1 1')
    unlock(lock)
    expect(existsSync(lock)).toBe(true)
  })
})

describe('a stamp of sources', () => {
  it('is the same until a file in them changes, comes or goes', () => {
    const sources = relative(root, join(folder, 'sources'))
    const file = join(folder, 'sources', 'deep', 'a.ts')
    mkdirSync(dirname(file), { recursive: true })
    const stamps = [stampOf([sources])]
    for (const act of [() => writeFileSync(file, '1'), () => writeFileSync(file, '22'), () => rmSync(file)]) {
      act()
      stamps.push(stampOf([sources]))
    }
    const [empty, one, two, again] = stamps
    expect(new Set([empty, one, two]).size).toBe(3)
    expect(again).toBe(empty)
    expect(stampOf([sources])).toBe(again)
  })
})

describe('a port', () => {
  it('is told as free or taken', async () => {
    const server = createServer().listen(await freePort(), '127.0.0.1')
    await new Promise((resolve) => server.once('listening', resolve))
    const { port } = server.address() as AddressInfo
    expect(await isFree(port)).toBe(false)
    await new Promise((resolve) => server.close(resolve))
    expect(await isFree(port)).toBe(true)
  })
})

describe('the private cluster', () => {
  const data = join(folder, 'data')
  const cluster = join(data, 'postgres')
  let stop: (() => Promise<void>) | undefined
  beforeAll(() => mkdirSync(data))
  afterAll(() => stop?.())

  const start = async () => {
    const started = await startLocalCluster(data)
    stop = started.stop
    return started
  }
  const query = async (url: string, sql: string) => {
    const client = new pg.Client({ connectionString: url })
    await client.connect()
    try {
      return (await client.query(sql)).rows
    } finally {
      await client.end()
    }
  }
  const killServer = async () => {
    const pid = Number(readFileSync(join(cluster, 'data', 'postmaster.pid'), 'utf8').split('\n')[0])
    process.kill(pid, 'SIGKILL')
    await expect.poll(() => startOfProcess(pid)).toBeUndefined()
  }

  it('is made anew where an earlier attempt was broken off, and asks for passwords', { timeout: 60_000 }, async () => {
    mkdirSync(join(data, 'postgres.partial', 'data'), { recursive: true })
    writeFileSync(join(data, 'postgres.partial', 'data', 'PG_VERSION'), '15')
    const { urls, wasRunning } = await start()
    expect(wasRunning).toBe(false)
    expect(existsSync(join(data, 'postgres.partial'))).toBe(false)
    await query(urls.owner, 'CREATE TABLE kept (a int); INSERT INTO kept VALUES (7); GRANT SELECT ON kept TO merestone_app')
    const wrong = Object.assign(new URL(urls.application), { password: 'wrong' }).href
    await expect(query(wrong, 'SELECT 1')).rejects.toThrow(/password authentication failed/)
    await expect(query(urls.application, 'CREATE ROLE another')).rejects.toThrow(/permission denied/)
  })

  it('is found running, and started again with its data after it was killed', { timeout: 60_000 }, async () => {
    expect((await start()).wasRunning).toBe(true)
    await killServer()
    expect(runningPort(cluster)).toBeUndefined()
    const { urls, revive } = await start()
    expect(await query(urls.application, 'SELECT a FROM kept')).toEqual([{ a: 7 }])
    await killServer()
    await revive()
    expect(await query(urls.application, 'SELECT a FROM kept')).toEqual([{ a: 7 }])
  })

  it('takes another port where its own is taken, and keeps to that', { timeout: 60_000 }, async () => {
    const settings = () => JSON.parse(readFileSync(join(cluster, 'settings.json'), 'utf8')) as { port: number }
    await stop!()
    const { port } = settings()
    const stranger = createServer().listen(port, '127.0.0.1')
    await new Promise((resolve) => stranger.once('listening', resolve))
    const { urls } = await start()
    expect(settings().port).not.toBe(port)
    expect(await query(urls.application, 'SELECT a FROM kept')).toEqual([{ a: 7 }])
    await new Promise((resolve) => stranger.close(resolve))
  })

  it('whose passwords are lost is left alone, with a word on what to do', async () => {
    await stop!()
    rmSync(join(cluster, 'settings.json'))
    await expect(startLocalCluster(data)).rejects.toThrow(/settings\.json.*Put it back/)
    expect(existsSync(join(cluster, 'data', 'PG_VERSION'))).toBe(true)
  })
})
