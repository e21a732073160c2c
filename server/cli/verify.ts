import { readFileSync } from 'node:fs'
import { parseArgs } from 'node:util'
import { ONE, parseRational } from '../../shared/engine/arithmetic/rational.ts'
import { hasValidSignature } from '../../shared/engine/certificate/signature.ts'
import { goalText, serves } from '../../shared/engine/methods/goal.ts'
import { readDefinition } from '../../shared/engine/sets/typeset.ts'
import { readCertificate } from '../../shared/schemas/certificate.ts'
import { readEngineRelease } from '../engine-release.ts'
import { repeatWithin } from './repeat-within.ts'

const USAGE = 'verify: repeats a certificate from its file alone\n\n  verify certificate.json [--key public-key.pem] [--json] [--minutes 240]'
/** As long as the longest run may use a core; no timer takes more than 24 days. */
const MINUTES = 240
const MOST_MINUTES = 24 * 24 * 60

/** Exit code 0 where the certificate holds, 1 where the file does not hold or is no certificate, 2 where no file was named or read, or the time was up. */
async function main(): Promise<number> {
  const { values, positionals } = readArguments()
  if (values.help) {
    console.log(USAGE)
    return 0
  }
  if (positionals.length !== 1) return complain('Name one file with a certificate (see --help).')
  const text = readText(positionals[0])
  if (text === null) return complain(`The file ${positionals[0]} cannot be read.`)
  const read = readCertificate(text)
  if ('problem' in read) return complain(read.problem, 1)
  const key = values.key === undefined ? undefined : readText(values.key)
  if (key === null) return complain(`The file ${values.key} cannot be read.`)

  const minutes = Number(values.minutes ?? MINUTES)
  if (!(minutes > 0 && minutes <= MOST_MINUTES)) return complain(`Write --minutes as a number up to ${MOST_MINUTES}.`)

  const { certificate } = read
  const repetition = await repeatWithin(minutes, certificate, showProgress())
  if (!repetition) return complain(`not decided: it was not repeated within ${minutes} minutes (--minutes gives it more)`)
  const { intact, repeats, findings } = repetition
  const signatureHolds = key === undefined ? null : await hasValidSignature(certificate, key)
  if (signatureHolds === false) findings.push('The signature is not that of the key given.')
  const holds = intact && repeats && signatureHolds !== false
  const sameEngine = readEngineRelease().digest === certificate.engine.digest

  if (values.json) {
    console.log(JSON.stringify({ holds, intact, repeats, signatureHolds, sameEngine, findings }))
    return holds ? 0 : 1
  }
  console.log(readDefinition(certificate.definition).text)
  console.log(`  in [${certificate.enclosure.lo}, ${certificate.enclosure.hi}]`)
  for (const finding of findings) console.log(`  ${finding}`)
  if (!serves(certificate.goal, parseRational(certificate.radius) ?? ONE)) console.log(`  It is wider than was asked for: ${goalText(certificate.goal)}.`)
  if (!sameEngine) console.log('  It was made by another release of the engine than this one.')
  if (certificate.signature && key === undefined) console.log('  It is signed; give the public key by --key to check the signature.')
  console.log(holds ? 'holds: the enclosure repeats to the last digit' : 'does not hold')
  return holds ? 0 : 1
}

function readArguments() {
  return parseArgs({
    options: { key: { type: 'string' }, minutes: { type: 'string' }, json: { type: 'boolean' }, help: { type: 'boolean' } },
    allowPositionals: true,
  })
}

function readText(path: string): string | null {
  try {
    return readFileSync(path, 'utf8')
  } catch {
    return null
  }
}

function complain(message: string, exitCode = 2): number {
  console.error(message)
  return exitCode
}

function showProgress(): ((share: number) => void) | undefined {
  if (!process.stderr.isTTY) return undefined
  return (share) => process.stderr.write(share < 1 ? `\r${Math.floor(share * 100)} %` : '\r      \r')
}

process.exitCode = await main().catch((error: unknown) => {
  if (error instanceof Error && 'code' in error && String(error.code).startsWith('ERR_PARSE_ARGS')) return complain(error.message)
  throw error
})
