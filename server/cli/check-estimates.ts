import { checkEstimates } from './estimate-check.ts'

/** `node … check-estimates [limit]`: tries the library of estimates numerically up to a limit, 10^8 unless given. */
const limit = Number(process.argv[2] ?? 1e8)
if (!Number.isInteger(limit) || limit < 100 || limit > 1e11) {
  console.error('The limit must be a whole number from 100 to 10^11.')
  process.exit(2)
}
const results = checkEstimates(limit)
for (const { id, looked, violations, lastViolation, tightest } of results) {
  const verdict = looked === 0 ? 'begins beyond the limit' : violations === 0 ? 'no violation' : `${violations} VIOLATIONS, last at ${lastViolation}`
  console.log(`${id.padEnd(44)} ${String(looked).padStart(10)}  ${tightest.toFixed(6)}  ${verdict}`)
}
process.exit(results.some(({ violations }) => violations > 0) ? 1 : 0)
