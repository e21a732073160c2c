import { spawn, type ChildProcess } from 'node:child_process'
import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { root } from '../../server/scripts/say.mjs'

const READY_MS = 120_000
/** Settings of the test run that the installation must not take over. */
const FOREIGN = ['DATABASE_URL', 'DATABASE_OWNER_URL', 'PUBLIC_URL', 'SESSION_SECRET', 'SMTP_URL', 'PORT']

/** Waits for a condition, also outside a test. */
export async function until(holds: () => boolean | Promise<boolean>, milliseconds: number, what: string): Promise<void> {
  for (const deadline = Date.now() + milliseconds; !(await holds()); await pause(100)) {
    if (Date.now() > deadline) throw new Error(`Waited ${milliseconds} ms in vain for ${what}`)
  }
}

/** `npm start` as a person runs it, on a data folder of its own: real processes, real database, real mail. */
export class Installation {
  /** Everything that it has printed. */
  output = ''
  readonly data: string
  private readonly child: ChildProcess
  private readonly exit: Promise<number | null>

  constructor(data: string, env: Record<string, string>) {
    this.data = data
    const inherited = Object.fromEntries(Object.entries(process.env).filter(([name]) => !FOREIGN.includes(name)))
    this.child = spawn(process.execPath, ['server/scripts/start.mjs'], {
      cwd: root,
      env: { ...inherited, NODE_ENV: 'production', LOG_LEVEL: 'info', DATA_DIR: data, ...env },
      stdio: ['ignore', 'pipe', 'pipe'],
    })
    for (const stream of [this.child.stdout, this.child.stderr]) stream?.on('data', (chunk) => (this.output += chunk))
    this.exit = new Promise((resolve) => this.child.once('exit', resolve))
  }

  /** Addresses of the product and of the caught mail, once it is ready. */
  async ready(): Promise<{ address: string; mail: string }> {
    await Promise.race([until(() => this.output.includes('Ctrl-C stops it.'), READY_MS, 'npm start to get ready'), this.exit])
    return { address: this.printed(/is ready: (\S+)/), mail: this.printed(/caught here: (\S+)/) }
  }

  /** The first of the demo accounts that it has printed. */
  demoAccount(): { email: string; password: string } {
    return { email: this.printed(/^ +(\S+@\S+)/m), password: this.printed(/password "([^"]+)"/) }
  }

  private printed(pattern: RegExp): string {
    const found = pattern.exec(this.output)?.[1]
    if (found === undefined) throw new Error(`It did not start:\n${this.output}`)
    return found
  }

  ended(): Promise<number | null> {
    return this.exit
  }

  end(signal: 'SIGTERM' | 'SIGINT' | 'SIGKILL'): Promise<number | null> {
    this.child.kill(signal)
    return this.exit
  }

  /** Its living processes by their command lines. */
  processes(): { pid: number; command: string }[] {
    return readdirSync('/proc')
      .filter((name) => /^\d+$/.test(name))
      .flatMap((name) => {
        try {
          const command = readFileSync(`/proc/${name}/cmdline`, 'utf8').replaceAll('\0', ' ')
          const ours = command.includes(this.data) || readFileSync(`/proc/${name}/environ`, 'utf8').includes(`DATA_DIR=${this.data}`)
          return ours && command !== '' ? [{ pid: Number(name), command }] : []
        } catch {
          // Ended meanwhile, or another user's.
          return []
        }
      })
  }

  /** Kills the process whose command line holds `part`, and waits until another is in its place. */
  async killAndAwaitNext(part: string): Promise<void> {
    const old = this.processes().find(({ command }) => command.includes(part))
    if (!old) throw new Error(`There is no process ${part}`)
    process.kill(old.pid, 'SIGKILL')
    await until(() => this.processes().some(({ pid, command }) => command.includes(part) && pid !== old.pid), 60_000, `another process ${part}`)
  }
}

/** A data folder that PostgreSQL's user can reach; `remove` when all is stopped. */
export function dataFolder(): { path: string; remove: () => void } {
  const path = mkdtempSync(join(tmpdir(), 'merestone-start-'))
  chmodSync(path, 0o755)
  return { path, remove: () => rmSync(path, { recursive: true, force: true }) }
}
