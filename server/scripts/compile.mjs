import { copyFileSync, existsSync, linkSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { dirname, join, relative } from 'node:path'
import ts from 'typescript'
import { root } from './say.mjs'

/*
 * `node compile.mjs <outDir> [<earlier>]`: turns the TypeScript of the server into JavaScript, file by file and without checking
 * types (that is for `npm run types`), which takes a second where the whole compiler takes six. What has not changed since the
 * earlier build is taken from there.
 */
const [outDir = 'dist/node', earlier = ''] = process.argv.slice(2)
const folders = ['server', 'shared', 'migrations', 'seeders']
/** Plain JavaScript that runs before anything is compiled. */
const excluded = 'server/scripts'
/** In a build: what each output was made from. */
const MANIFEST = '.files.json'

const { config } = ts.parseConfigFileTextToJson('tsconfig.json', readFileSync(join(root, 'tsconfig.json'), 'utf8'))
const { options } = ts.convertCompilerOptionsFromJson(
  { ...config.compilerOptions, noEmit: false, allowImportingTsExtensions: false, rewriteRelativeImportExtensions: true, sourceMap: true },
  root,
)
/** Outputs of another compiler or other options are not taken over. */
const compiler = JSON.stringify([ts.version, options])

/** @typedef {{ compiler: string, files: Record<string, string> }} Manifest */
const manifestFile = join(root, earlier, MANIFEST)
/** @type {Manifest} */
const before = earlier !== '' && existsSync(manifestFile) ? JSON.parse(readFileSync(manifestFile, 'utf8')) : { compiler, files: {} }
/** @type {Manifest} */
const now = { compiler, files: {} }
/** @type {ts.Diagnostic[]} */
const mistakes = []

/** @param {string} path */
function compileFolder(path) {
  for (const entry of readdirSync(join(root, path), { withFileTypes: true })) {
    const child = `${path}/${entry.name}`
    if (entry.isDirectory()) {
      if (child !== excluded) compileFolder(child)
    } else if (/\.tsx?$/.test(entry.name)) {
      compileFile(child)
    } else if (/\.(mjs|json)$/.test(entry.name)) {
      copyFileSync(join(root, child), placeOf(child))
    }
  }
}

/** @param {string} path */
function compileFile(path) {
  const outputs = ['.js', '.js.map'].map((extension) => path.replace(/\.tsx?$/, extension))
  const { size, mtimeMs } = statSync(join(root, path))
  const version = `${size} ${mtimeMs}`
  now.files[path] = version
  if (before.compiler === compiler && before.files[path] === version) {
    for (const output of outputs) linkSync(join(root, earlier, output), placeOf(output))
    return
  }
  const result = ts.transpileModule(readFileSync(join(root, path), 'utf8'), { fileName: path, compilerOptions: options, reportDiagnostics: true })
  mistakes.push(...(result.diagnostics ?? []))
  const [code, map] = outputs.map(placeOf)
  // The map names its source relative to itself, so that a stack trace leads to the file that one edits.
  const sources = [relative(dirname(map), join(root, path))]
  writeFileSync(code, result.outputText)
  writeFileSync(map, JSON.stringify({ ...JSON.parse(result.sourceMapText ?? '{}'), sources }))
}

/**
 * Where a file of the build goes; its folder is made.
 * @param {string} path
 */
function placeOf(path) {
  const target = join(root, outDir, path)
  mkdirSync(dirname(target), { recursive: true })
  return target
}

folders.forEach(compileFolder)
writeFileSync(placeOf(MANIFEST), JSON.stringify(now))

if (mistakes.length > 0) {
  process.stderr.write(ts.formatDiagnostics(mistakes, { getCanonicalFileName: (name) => name, getCurrentDirectory: () => root, getNewLine: () => '\n' }))
  process.exitCode = 1
}
