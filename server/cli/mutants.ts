import { spawnSync } from 'node:child_process'
import { cpSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { projectRoot } from '../project-root.ts'
import { type Fault, FAULTS } from './mutants-faults.ts'

/** What a copy of the project needs to run the tests of the engine. */
const COPIED = ['shared', 'server', 'seeders', 'migrations', 'tests', 'package.json', 'tsconfig.json', 'vite.config.ts']

/** Makes a throw-away copy of the project, sharing the installed packages. */
function copyProject(): string {
  const folder = mkdtempSync(join(tmpdir(), 'merestone-mutants-'))
  for (const name of COPIED) cpSync(join(projectRoot, name), join(folder, name), { recursive: true })
  symlinkSync(join(projectRoot, 'node_modules'), join(folder, 'node_modules'))
  return folder
}

interface TestRun {
  passed: boolean
  /** The closing line of the test run, or why there is none. */
  closing: string
}

function runTests(folder: string, tests: readonly string[]): TestRun {
  const vitest = join(folder, 'node_modules', 'vitest', 'vitest.mjs')
  const run = spawnSync(process.execPath, [vitest, 'run', '--project', 'engine', '--bail', '1', ...tests], { cwd: folder, encoding: 'utf8', timeout: 600_000 })
  const closing = /^\d+ passed, \d+ failed$/m.exec(run.stdout)?.[0]
  return { passed: run.status === 0, closing: closing ?? `no test ran: ${(run.stderr || run.stdout).slice(-300)}` }
}

/** Puts the fault in; a text that is not there exactly once is a mistake in the list. */
function plant(folder: string, fault: Fault): () => void {
  const path = join(folder, fault.file)
  const text = readFileSync(path, 'utf8')
  if (text.split(fault.find).length !== 2) throw new Error(`${fault.name}: the text to change is not there exactly once in ${fault.file}`)
  writeFileSync(path, text.replace(fault.find, () => fault.replace))
  return () => writeFileSync(path, text)
}

/**
 * `npm run mutants`: every fault of the list must turn some test red. The same tests must be green without it, or red would
 * mean nothing. Exit code 1 where a fault goes unnoticed. Words on the command line choose faults by name.
 */
function main(words: string[]): void {
  const chosen = FAULTS.filter((fault) => words.length === 0 || words.some((word) => fault.name.includes(word)))
  const folder = copyProject()
  try {
    const tests = [...new Set(chosen.flatMap((fault) => fault.tests))]
    const sound = runTests(folder, tests)
    if (!sound.passed) throw new Error(`The tests are not green without any fault: ${sound.closing}`)
    console.log(`no fault: ${sound.closing}`)
    let unnoticed = 0
    for (const fault of chosen) {
      const restore = plant(folder, fault)
      const { passed, closing } = runTests(folder, fault.tests)
      restore()
      // A run in which no test failed, because none could start, proves nothing.
      const noticed = !passed && / [1-9]\d* failed/.test(closing)
      if (!noticed) unnoticed += 1
      console.log(`${noticed ? 'noticed  ' : 'UNNOTICED'}  ${fault.name} (${closing})`)
    }
    console.log(`${chosen.length - unnoticed} of ${chosen.length} faults noticed`)
    process.exitCode = unnoticed === 0 ? 0 : 1
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

main(process.argv.slice(2))
