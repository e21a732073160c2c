/** Example data for the tests of views and for the pages under client/dev. The people and the institute are invented. */
import type { Claim, ClaimSummary, Desk } from '../../shared/schemas/claim.ts'
import type { Constant, ConstantSummary } from '../../shared/schemas/constant.ts'
import type { Plan, Run } from '../../shared/schemas/run.ts'

const id = (last: number) => `00000000-0000-4000-8000-${String(last).padStart(12, '0')}`
const GROUP = { id: id(1), name: 'Haldern Institute' }
const AUTHOR = { id: id(11), name: 'Ilse Varga' }
const REFEREE = { id: id(12), name: 'Tomas Brandt' }
const DIGEST = '9c1f4b7e20d85a63c9e1f07a4d2b8c55e60f19a3b7d4c2e80516f3a9d7b2e07a'

const almostPrimes = (k: number) => ({
  canonical: { type: 'series', set: { kind: 'almost-primes', k, exclude: [] }, weight: { power: '1', logPower: '1' } },
  latex: `\\sum_{\\Omega(n)=${k}} \\frac{1}{n \\log n}`,
  text: `sum of 1/(n log n) over the integers with exactly ${k} prime factors`,
  aliases: [],
})
// First digits of these sums: Forum Math. Pi 11 (2023) e18 and J. Number Theory 211 (2020) 513-529; further ones by Arb 2.23.
const VALUES = [
  { lo: '1.6366163233512608685696580039218636711815970761312', hi: '1.6366163233512608685696580039218636711815970761314' },
  { lo: '1.144816573405917991524450173893341079131304974017', hi: '1.144816573405917991524450173893341079131304974018' },
  { lo: '1.03083510179321757195568889979610039092', hi: '1.03083510179321757195568889979610039094' },
  { lo: '0.99734214859525235977', hi: '0.99734214859525235978' },
]
const THIRD = { lo: '1.03083510179321757195568889979610039092', hi: '1.03083510179321757195568889979610039094' }

export const constantSummaries: ConstantSummary[] = VALUES.map((value, index) => ({
  number: `MST-000${index + 1}`,
  definition:
    index === 0
      ? { canonical: {}, latex: '\\sum_{p} \\frac{1}{p \\log p}', text: 'sum of 1/(p log p) over the primes', aliases: ['Erdős sum of the primes'] }
      : almostPrimes(index + 1),
  best: index === 3 ? null : { ...value, digits: { truncated: value.lo.length - 4, rounded: value.lo.length - 4 } },
  state: (['signed', 'signed', 'in-review', 'stated'] as const)[index] ?? 'stated',
  inConflict: index === 1,
  group: GROUP,
  changedAt: `2026-0${index + 3}-12T09:30:00Z`,
}))

export const plan: Plan = {
  definition: almostPrimes(3),
  constant: 'MST-0003',
  without: [],
  forecasts: [
    { method: 'transform', arithmetic: 'ball', possible: true, reason: null, radius: '2.1e-42', seconds: 0.8, recommended: true },
    { method: 'transform', arithmetic: 'mpfr', possible: true, reason: null, radius: '2.1e-42', seconds: 4.2, recommended: false },
    { method: 'panels', arithmetic: 'ball', possible: true, reason: null, radius: '7.4e-43', seconds: 1.1, recommended: false },
    { method: 'partial-sum', arithmetic: 'ball', possible: false, reason: 'Adding terms up to 10^12 gives 5 digits at most. Ask for fewer digits or choose the transform.', radius: null, seconds: null, recommended: false },
    { method: 'finite', arithmetic: 'ball', possible: false, reason: 'The set is not finite.', radius: null, seconds: null, recommended: false },
  ],
}

const outcome: NonNullable<Run['outcome']> = {
  enclosure: THIRD,
  radius: '9.9e-39',
  digits: { truncated: 36, rounded: 37 },
  parameters: { step: '1/12', bits: 192, firstNode: -4210, lastNode: 96, splitPrimes: 61, powers: 74, borweinTerms: 92 },
  budget: [
    { source: 'discretisation', bound: 'T-2', statement: 'The trapezoid sum with step h is within F κ of F, κ = 2 (cos a)^−b / (exp(2πa/h) − 1).', magnitude: '8.2e-39' },
    { source: 'truncation-below', bound: 'T-3', statement: 'The nodes left out below are at most a geometric series with the ratio of the first two.', magnitude: '3.1e-40' },
    { source: 'truncation-above', bound: 'T-4', statement: 'The nodes left out above decay at least as fast as the least member of the set demands.', magnitude: '6.0e-45' },
    { source: 'series', bound: 'T-6', statement: 'Terms beyond m = M of the series for the prime zeta function.', magnitude: '1.4e-39' },
    { source: 'rounding', bound: 'A-1', statement: 'Every rounding counted as a unit in the last place.', magnitude: '2.2e-46' },
  ],
  estimates: [],
  convergence: [
    { at: '400', lo: '0.9', hi: '1.2' }, { at: '1200', lo: '1.0308', hi: '1.0309' }, { at: '2400', lo: '1.0308351017932', hi: '1.0308351017933' },
    { at: '3600', lo: '1.0308351017932175719556', hi: '1.0308351017932175719558' }, { at: '4306', ...THIRD },
  ],
  certificateDigest: DIGEST,
}

export const finishedRun: Run = {
  id: id(31), constant: 'MST-0003', definition: almostPrimes(3), state: 'done', method: 'transform', arithmetic: 'ball', goal: { digits: 36 },
  progress: 1, purpose: 'run', claimNumber: null, startedBy: AUTHOR, createdAt: '2026-05-02T08:00:00Z', startedAt: '2026-05-02T08:00:01Z',
  finishedAt: '2026-05-02T08:00:03Z', digits: outcome.digits, group: GROUP, without: [], forecastSeconds: 0.9, cpuSeconds: 1.1, secondsLeft: null,
  shards: { done: 16, total: 16 }, outcome, failure: null, claims: [], abilities: { stop: false, resume: false, registerClaim: true },
}
export const workingRun: Run = {
  ...finishedRun, id: id(32), state: 'running', progress: 0.43, finishedAt: null, outcome: null, digits: null, goal: { digits: 200 }, secondsLeft: 41,
  cpuSeconds: 33, shards: { done: 28, total: 64 }, abilities: { stop: true, resume: false, registerClaim: false },
}
export const failedRun: Run = { ...workingRun, id: id(33), state: 'failed', failure: 'The worker ran out of memory twice. Ask for fewer digits.', abilities: { stop: false, resume: true, registerClaim: false } }

export const claimSummary: ClaimSummary = {
  id: id(41), number: 'MST-0003/1', kind: 'enclosure', constant: 'MST-0003', definition: almostPrimes(3), otherConstant: null, enclosure: THIRD,
  digits: outcome.digits, state: 'in-review', inConflict: false, repeatedHere: true, author: AUTHOR, group: GROUP, since: '2026-05-03T10:00:00Z', signedAt: null,
}

const evidence: Claim['evidence'] = [{ id: id(51), name: 'sum-over-three-prime-factors.pdf', mediaType: 'application/pdf', bytes: 284_112, digest: DIGEST, uploadedBy: AUTHOR, uploadedAt: '2026-05-02T09:00:00Z' }]
const assignment: Claim['assignments'][number] = {
  id: id(61), referee: REFEREE, refereeGroup: 'Haldern Institute', state: 'accepted', verdict: null, verdictCurrent: false, remark: null, declineReason: null,
  checklist: [], askedAt: '2026-05-03T10:00:00Z', answeredAt: '2026-05-04T07:30:00Z', verdictAt: null,
}
const recheck: Claim['rechecks'][number] = {
  runId: id(71), startedBy: REFEREE, state: 'done', progress: 1, method: 'transform', arithmetic: 'mpfr',
  enclosure: { lo: '1.030835101793217571955688899796100390927', hi: '1.030835101793217571955688899796100390945' }, verdict: 'meets', independent: true, finishedAt: '2026-05-04T08:00:00Z', failure: null,
}

export const claimInReview: Claim = {
  ...claimSummary, version: 3, remark: 'The step was chosen for 36 digits; the digits in Table 2 of the manuscript are these, truncated.', source: null,
  run: { id: finishedRun.id, method: 'transform', arithmetic: 'ball' }, outcome, doubts: [], digest: DIGEST, certificate: { digest: DIGEST, signed: false, keyId: null }, evidence,
  assignments: [assignment], objections: [], rechecks: [recheck],
  checklist: [{ item: 'T-2, discretisation', detail: 'At most 8.2e-39: F κ with a = arctan(2π/(bh)).' }, { item: 'T-3, truncation below', detail: 'At most 3.1e-40.' }],
  confirmations: { have: 0, need: 1, recheckNeeded: true, recheckDone: true }, conflicts: [], supersededBy: null, supersedes: null, order: null, statedValue: null,
  next: 'the referee: give a verdict', signature: null, cite: null, draftVerdict: null, possibleReferees: [], abilities: {},
  history: [
    { at: '2026-05-02T08:30:00Z', actor: 'Ilse Varga', act: 'draft', from: null, to: 'draft', reason: null },
    { at: '2026-05-03T09:00:00Z', actor: 'Ilse Varga', act: 'submit', from: 'draft', to: 'submitted', reason: null },
    { at: '2026-05-03T10:00:00Z', actor: 'Maren Holt', act: 'assign', from: 'submitted', to: 'in-review', reason: null },
  ],
}
export const claimForReferee: Claim = { ...claimInReview, abilities: { decline: true, recheck: true, confirm: true, object: true, 'draft-verdict': true }, draftVerdict: 'The recheck by mpfr meets it.' }
export const claimForAuthor: Claim = {
  ...claimInReview, number: null, state: 'draft', assignments: [], rechecks: [], next: 'the author: submit it', abilities: { edit: true, submit: true, delete: true, attach: true, detach: true },
}
export const claimReturned: Claim = {
  ...claimInReview, state: 'returned', next: 'the author: answer the objection', abilities: { edit: true, attach: true, answer: true },
  assignments: [{ ...assignment, verdict: 'objected', verdictCurrent: true, verdictAt: '2026-05-05T09:00:00Z' }],
  objections: [{ id: id(81), referee: REFEREE, state: 'open', messages: [{ author: REFEREE, text: 'Table 2 prints 1.0308351018: that is rounded, not truncated.', at: '2026-05-05T09:00:00Z' }], abilities: { answer: true, settle: false } }],
}
export const claimForLead: Claim = {
  ...claimInReview, state: 'endorsed', next: 'a lead: sign it', abilities: { sign: true, return: true, withdraw: true, assign: true, remind: true },
  assignments: [{ ...assignment, verdict: 'confirmed', verdictCurrent: true, remark: 'Rechecked by mpfr; all 36 digits stand.', verdictAt: '2026-05-05T09:00:00Z' }],
  confirmations: { have: 1, need: 1, recheckNeeded: true, recheckDone: true }, possibleReferees: [{ ...REFEREE, group: 'Haldern Institute' }],
}
export const claimSigned: Claim = {
  ...claimForLead, state: 'signed', signedAt: '2026-05-06T12:00:00Z', next: 'nobody', abilities: {}, possibleReferees: [],
  certificate: { digest: DIGEST, signed: true, keyId: 'k-7f3a' }, signature: { by: 'Maren Holt', at: '2026-05-06T12:00:00Z' },
  cite: { plain: 'Haldern Institute, MST-0003/1: sum of 1/(n log n) over the integers with exactly 3 prime factors, enclosure certified to 36 digits, signed 6 May 2026.', bibtex: '@misc{MST-0003-1}' },
}

export const constant: Constant = {
  ...(constantSummaries[2] as ConstantSummary), state: 'signed', convergence: 'It converges: the members up to x number about x (log log x)^2 / (2 log x), and the weight falls as 1/(x log x).',
  firstMembers: ['8', '12', '18', '20', '27', '28', '30', '42', '44', '45'],
  claims: [claimSigned, { ...claimSummary, id: id(42), number: 'MST-0003/2', state: 'superseded', enclosure: { lo: '1.0308351', hi: '1.0308352' }, digits: { truncated: 6, rounded: 6 } }],
  narrowing: [
    { at: '2026-02-11T10:00:00Z', lo: '1.0308351', hi: '1.0308352', digits: 6, claim: 'MST-0003/2', author: 'Tomas Brandt' },
    { at: '2026-05-06T12:00:00Z', ...THIRD, digits: 36, claim: 'MST-0003/1', author: 'Ilse Varga' },
  ],
  conflicts: [], usedBy: [], restsOn: [], cite: { plain: 'Haldern Institute, MST-0003.', bibtex: '@misc{MST-0003}' }, statedBy: 'Ilse Varga', statedAt: '2026-02-01T10:00:00Z', runs: [],
}

export const desk: Desk = {
  lead: [{ kind: 'sign', claim: { ...claimSummary, state: 'endorsed' }, since: '2026-05-05T09:00:00Z', text: 'Sign MST-0003/1' }, { kind: 'assign', claim: { ...claimSummary, id: id(43), number: 'MST-0002/1', constant: 'MST-0002', enclosure: VALUES[1] ?? null, state: 'submitted' }, since: '2026-05-01T09:00:00Z', text: 'Ask a referee for MST-0002/1' }],
  referee: [],
  researcher: [{ kind: 'answer', claim: { ...claimSummary, state: 'returned' }, since: '2026-05-05T09:00:00Z', text: 'Answer the objection to MST-0003/1' }],
  total: { lead: 2, referee: 0, researcher: 1 },
}
