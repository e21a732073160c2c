import { mkdirSync } from 'node:fs'
import { pathToFileURL } from 'node:url'
import { ensureClientBuild, ensureServerBuild } from './build.mjs'
import { ensurePackages } from './packages.mjs'
import { ensureBinaries } from './postgres-binaries.mjs'
import { dataFolder, runMain } from './say.mjs'

/** Everything that the product needs before it starts, in the order in which one part needs another. */
export async function setUp() {
  mkdirSync(dataFolder, { recursive: true })
  await ensurePackages()
  if (!process.env.DATABASE_URL) await ensureBinaries()
  await ensureServerBuild()
  await ensureClientBuild()
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) await runMain(setUp)
