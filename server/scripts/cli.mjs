import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { ensureServerBuild } from './build.mjs'
import { ensurePackages } from './packages.mjs'
import { root, runMain, SetupError } from './say.mjs'

/*
 * `node cli.mjs <name> …` runs server/cli/<name>.ts from the compiled build, in this very process, so that nothing is added to its
 * start but a look whether the build is fresh. The command's own arguments follow its name.
 */
await runMain(async () => {
  const [name = '', ...rest] = process.argv.slice(2)
  if (!/^[a-z-]+$/.test(name) || !existsSync(join(root, 'server', 'cli', `${name}.ts`))) throw new SetupError(`There is no command "${name}".`)
  await ensurePackages()
  await ensureServerBuild()
  const command = join(root, 'dist', 'node', 'server', 'cli', `${name}.js`)
  process.argv = [process.execPath, command, ...rest]
  await import(pathToFileURL(command).href)
})
