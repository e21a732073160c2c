import { randomBytes } from 'node:crypto'
import { mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { readMail, type ReadMail } from './mime.ts'

/** Oldest messages beyond this number are dropped. */
const MOST = 1_000
const NAME = /^\d{13}-[0-9a-f]{8}\.eml$/

export type StoredMail = ReadMail & { id: string; receivedAt: string }

/** The caught messages, one file each, so that they outlive a restart and can be opened by any mail program. */
export class MailStore {
  private readonly folder: string

  constructor(folder: string) {
    this.folder = folder
    mkdirSync(folder, { recursive: true, mode: 0o700 })
  }

  add(source: Buffer): void {
    const name = `${Date.now()}-${randomBytes(4).toString('hex')}.eml`
    writeFileSync(join(this.folder, `${name}.part`), source, { mode: 0o600 })
    renameSync(join(this.folder, `${name}.part`), join(this.folder, name))
    for (const old of this.names().slice(MOST)) rmSync(join(this.folder, old), { force: true })
  }

  /** Newest first. */
  list(): StoredMail[] {
    return this.names().map((name) => this.read(name))
  }

  find(id: string): StoredMail | undefined {
    const name = `${id}.eml`
    return this.names().includes(name) ? this.read(name) : undefined
  }

  private names(): string[] {
    return readdirSync(this.folder).filter((name) => NAME.test(name)).sort().reverse()
  }

  private read(name: string): StoredMail {
    return { id: name.replace(/\.eml$/, ''), receivedAt: new Date(Number(name.slice(0, 13))).toISOString(), ...readMail(readFileSync(join(this.folder, name))) }
  }
}
