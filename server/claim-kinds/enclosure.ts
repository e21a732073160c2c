import type { Transaction } from 'sequelize'
import { conflict, unprocessable } from '../errors.ts'
import { boundTitle } from '../engine/bounds.ts'
import { Run } from '../models/run.ts'
import type { ClaimContent, ClaimKind, Claimant } from './claim-kind.ts'
import { estimateItem } from './estimate-item.ts'

/** An enclosure that a run of this installation has computed; its certificate is the run's. */
export const enclosure: ClaimKind<{ runId: string }> = {
  computed: true,
  content: (transaction, claimant, { runId }) => contentOfRun(transaction, claimant, runId),
  renew: (transaction, claimant, claim, patch) => contentOfRun(transaction, claimant, patch.runId ?? claim.runId ?? ''),

  async beforeSigning(transaction, claim) {
    const run = claim.runId === null ? null : await Run.findByPk(claim.runId, { transaction })
    if (run?.state !== 'done' || run.certificateDigest !== claim.certificateDigest) throw conflict('basis_fallen', 'The run that this claim rests on is not there any more.')
  },

  checklist(_claim, outcome, doubts) {
    if (!outcome) return []
    const bounds = outcome.budget.map(({ bound, magnitude, source }) => ({
      item: `Bound ${bound}`,
      detail: `${boundTitle(bound)}; brings ${magnitude.replace('e', ' · 10^')} to the radius (${source.replace('-', ' ')})`,
    }))
    return [...outcome.estimates.map((use) => estimateItem(use, doubts)), ...bounds]
  },
}

async function contentOfRun(transaction: Transaction, claimant: Claimant, runId: string): Promise<ClaimContent> {
  const run = await Run.findByPk(runId, { transaction })
  if (!run || run.groupId !== claimant.groupId || run.purpose !== 'run') throw unprocessable('run_unknown', 'Choose a run of your own group.', 'runId')
  if (run.state !== 'done' || !run.outcome || run.certificate === null || run.certificateDigest === null) {
    throw unprocessable('run_not_done', 'A claim is registered from a run that is done.', 'runId')
  }
  return {
    constantId: run.constantId,
    otherConstantId: null,
    lo: run.outcome.enclosure.lo,
    hi: run.outcome.enclosure.hi,
    digitsTruncated: run.outcome.digits.truncated,
    digitsRounded: run.outcome.digits.rounded,
    runId: run.id,
    basis: {},
    source: null,
    repeatedHere: true,
    certificate: run.certificate,
    certificateDigest: run.certificateDigest,
  }
}
