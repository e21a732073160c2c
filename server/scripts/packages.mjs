import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { withLock } from './lock.mjs'
import { root, say, SetupError } from './say.mjs'

const MINIMUM = [20, 19]
const stampFile = join(root, 'node_modules', '.merestone-stamp')

/** Refuses a Node.js that the packages do not run on, before anything fails in a less clear way. */
export function checkNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
  if (major > MINIMUM[0] || (major === MINIMUM[0] && minor >= MINIMUM[1])) return
  throw new SetupError(`Merestone needs Node.js ${MINIMUM.join('.')} or later; this is ${process.versions.node}. Install Node.js 20 and try again.`)
}

/** What node_modules must have been installed from: this Node.js, the lock file, and what package.json asks for. */
function wantedStamp() {
  const { dependencies, devDependencies, overrides } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'))
  return createHash('sha256')
    .update(JSON.stringify([process.version, dependencies, devDependencies, overrides]))
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex')
}

const isInstalled = () => existsSync(stampFile) && readFileSync(stampFile, 'utf8') === wantedStamp()

/** Installs the npm packages from the lock file, unless they are. The stamp is written last, so that a broken-off installation is done again. */
export async function ensurePackages() {
  checkNode()
  if (isInstalled()) return
  await withLock(
    join(root, '.data', 'install.lock'),
    () => {
      if (isInstalled()) return
      say('Installing the npm packages from package-lock.json …')
      // NODE_ENV=production would leave out what builds the client.
      const run = spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
        cwd: root,
        env: { ...process.env, NODE_ENV: 'development' },
        stdio: ['ignore', 2, 2],
      })
      if (run.error) throw new SetupError(`npm cannot be run: ${run.error.message}`)
      if (run.status !== 0) throw new SetupError('npm ci failed; its own words are above. Mend that and run the same command again.')
      writeFileSync(stampFile, wantedStamp())
    },
    (holder) => say(`Another process (${holder.split(' ')[0]}) is installing the npm packages; waiting for it …`),
  )
}
