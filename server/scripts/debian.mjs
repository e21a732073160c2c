import { spawnSync } from 'node:child_process'
import { accessSync, constants, existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { withLock } from './lock.mjs'
import { root, say, SetupError } from './say.mjs'

/**
 * Where a program is, on the PATH.
 * @param {string} name
 */
export function findProgram(name) {
  for (const folder of (process.env.PATH ?? '').split(delimiter)) {
    try {
      accessSync(join(folder, name), constants.X_OK)
      return join(folder, name)
    } catch {
      // Not in this folder.
    }
  }
  return undefined
}

/**
 * @typedef {object} Need
 * @property {string} debian name of the Debian package
 * @property {string} why what it is for, in a few words
 * @property {() => boolean} isPresent
 */

/**
 * Sees to it that all needs are present: as root on Debian by apt-get, saying so first; otherwise by telling which command to run.
 * @param {Need[]} needs
 */
export async function ensureDebian(needs) {
  const absent = () => needs.filter((need) => !need.isPresent())
  if (absent().length === 0) return
  await withLock(join(root, '.data', 'apt.lock'), () => {
    const missing = absent()
    if (missing.length === 0) return
    const list = missing.map((need) => `  ${need.debian}: ${need.why}`).join('\n')
    const install = `apt-get install -y --no-install-recommends ${missing.map((need) => need.debian).join(' ')}`
    const apt = findProgram('apt-get')
    if (apt === undefined) throw new SetupError(`These programs are needed and absent:\n${list}\nInstall them with your system's package manager, then run the same command again.`)
    if (process.getuid?.() !== 0) throw new SetupError(`These Debian packages are needed and absent:\n${list}\nRun this, then the same command again:\n  sudo ${install}`)
    say(`Installing Debian packages with apt-get:\n${list}`)
    aptGet(['update'])
    aptGet(install.split(' ').slice(1))
    const still = absent()
    if (still.length > 0) throw new SetupError(`apt-get has finished, but ${still.map((need) => need.debian).join(', ')} cannot be found.`)
  })
}

/** @param {string[]} args */
function aptGet(args) {
  const run = spawnSync('apt-get', ['-q', '-o', 'DPkg::Lock::Timeout=300', ...args], {
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    stdio: ['ignore', 2, 2],
  })
  if (run.status !== 0) throw new SetupError(`apt-get ${args.join(' ')} failed; its own words are above. Mend that and run the same command again.`)
}

/** Programs that only the tests use. @type {Record<string, Need>} */
export const testTools = {
  chromium: { debian: 'chromium', why: 'the browser tests', isPresent: () => existsSync('/usr/bin/chromium') || findProgram('chromium') !== undefined },
  gp: { debian: 'pari-gp', why: 'reference values by PARI/GP', isPresent: () => findProgram('gp') !== undefined },
  primesieve: { debian: 'primesieve-bin', why: 'reference counts of primes', isPresent: () => findProgram('primesieve') !== undefined },
  primecount: { debian: 'primecount-bin', why: 'reference counts of primes', isPresent: () => findProgram('primecount') !== undefined },
}
