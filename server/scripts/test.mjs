import { spawn } from 'node:child_process'
import { constants } from 'node:os'
import { join } from 'node:path'
import { ensureClientBuild, ensureServerBuild } from './build.mjs'
import { ensureDebian, testTools } from './debian.mjs'
import { ensurePackages } from './packages.mjs'
import { ensureBinaries } from './postgres-binaries.mjs'
import { root, runMain } from './say.mjs'

/** The folders of tests, with what they need besides the npm packages. @type {Record<string, (() => Promise<unknown>)[]>} */
const needs = {
  reference: [() => ensureDebian([testTools.gp, testTools.primesieve, testTools.primecount])],
  api: [ensureBinaries],
  jobs: [ensureBinaries],
  server: [ensureBinaries, ensureServerBuild, ensureClientBuild],
  e2e: [ensureBinaries, () => ensureDebian([testTools.chromium]), ensureServerBuild, ensureClientBuild],
}

/**
 * Which folders a run can touch: those that the arguments name, all where they name none.
 * @param {string[]} args
 */
function foldersOf(args) {
  const named = Object.keys(needs).filter((folder) => args.some((arg) => arg.includes(`tests/${folder}`)))
  const filtered = args.some((arg) => arg.startsWith('tests/'))
  return filtered ? named : Object.keys(needs)
}

/*
 * `npm test [-- arguments of vitest]`: sets up what the tests need and runs them. The last line, `N passed, N failed`, comes from
 * tests/support/summary-reporter.ts; a run without a single test fails.
 */
await runMain(async () => {
  const args = process.argv.slice(2)
  await ensurePackages()
  for (const provide of new Set(foldersOf(args).flatMap((folder) => needs[folder] ?? []))) await provide()
  const vitest = spawn(process.execPath, [join(root, 'node_modules', 'vitest', 'vitest.mjs'), 'run', ...args], {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, NODE_ENV: 'test' },
  })
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) process.on(signal, () => vitest.kill(signal))
  process.exitCode = await new Promise((resolve, reject) => {
    vitest.on('error', reject)
    vitest.on('exit', (code, signal) => resolve(code ?? 128 + (signal ? constants.signals[signal] : 0)))
  })
})
