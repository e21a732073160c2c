import { randomBytes } from 'node:crypto'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import pg from 'pg'
import { afterAll, inject } from 'vitest'
import type { ClusterUrls } from './database.ts'

/*
 * Runs before each test file of the projects with a database: gives it a copy of the migrated template and a folder for keys, and
 * points the settings at them. The server's modules read the settings when they are first imported, which is after this.
 */

const cluster = inject('cluster')
const name = `test_${randomBytes(8).toString('hex')}`

/** The same address with the name of this file's database. */
const named = (url: string): string => Object.assign(new URL(url), { pathname: `/${name}` }).href

/** Addresses of this test file's database; `owner` may do what the product's own role may not. */
export const databaseUrls: ClusterUrls = { superuser: named(cluster.superuser), owner: named(cluster.owner), application: named(cluster.application) }

async function asSuperuser(work: (client: pg.Client) => Promise<unknown>): Promise<void> {
  const client = new pg.Client({ connectionString: cluster.superuser })
  await client.connect()
  try {
    await work(client)
  } finally {
    await client.end()
  }
}

const template = new URL(cluster.owner).pathname.slice(1)
const owner = new URL(cluster.owner).username
const application = new URL(cluster.application).username
const dataFolder = mkdtempSync(join(tmpdir(), 'merestone-data-'))

await asSuperuser(async (client) => {
  await client.query(`CREATE DATABASE ${name} TEMPLATE ${template} OWNER ${owner}`)
  await client.query(`GRANT CONNECT, CREATE, TEMPORARY ON DATABASE ${name} TO ${application}`)
})

Object.assign(process.env, {
  NODE_ENV: 'test',
  DATABASE_URL: databaseUrls.application,
  DATABASE_OWNER_URL: databaseUrls.owner,
  DATA_DIR: dataFolder,
  PUBLIC_URL: 'http://merestone.test',
  LOG_LEVEL: process.env.LOG_LEVEL ?? 'silent',
  RATE_LIMIT: '1000000',
  SESSION_SECRET: 'only-the-tests-use-this-secret-of-ours',
})

afterAll(async () => {
  const { sequelize } = await import('../../server/db.ts')
  await sequelize.close()
  await asSuperuser((client) => client.query(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`))
  rmSync(dataFolder, { recursive: true, force: true })
})
