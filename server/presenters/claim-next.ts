import { missingForEndorsement, type Facts } from '../../shared/claim-life.ts'
import type { ClaimState } from '../../shared/schemas/claim.ts'

interface Situation {
  state: ClaimState
  author: string
  facts: Facts
  assignments: readonly { referee_name: string; state: string; verdict: string | null; verdict_current: boolean }[]
  objections: readonly { referee_name: string; state: string }[]
}

/** Who is to act next on a claim, and how, in words. */
export function nextStep({ state, author, facts, assignments, objections }: Situation): string {
  switch (state) {
    case 'draft':
      return `${author}: submit the draft`
    case 'submitted':
      return 'a lead: assign a referee'
    case 'in-review':
      return reviewSteps(facts, assignments, objections)
    case 'returned':
      return facts.unanswered === 0 ? `${author}: resubmit` : `${author}: answer the ${facts.unanswered === 1 ? 'objection' : `${facts.unanswered} objections`}, then resubmit`
    case 'endorsed':
      if (facts.estimateInDoubt) return 'a lead: an estimate that it rests on is in doubt; lift the doubt or return the claim'
      return facts.contradicted ? 'a lead: settle the conflict, then sign' : 'a lead: sign'
    case 'suspended':
      return facts.estimateInDoubt ? 'a lead: lift the doubt about an estimate that it rests on, or withdraw' : 'a lead: reinstate or withdraw'
    case 'signed':
    case 'superseded':
      return 'nobody: it is in the register'
    case 'withdrawn':
      return 'nobody: it is withdrawn'
  }
}

function reviewSteps(facts: Facts, assignments: Situation['assignments'], objections: Situation['objections']): string {
  const steps = [
    ...assignments.filter(({ state }) => state === 'asked').map(({ referee_name }) => `${referee_name}: accept or decline the review`),
    ...objections.filter(({ state }) => state === 'answered').map(({ referee_name }) => `${referee_name}: settle or uphold the objection`),
    ...assignments.filter(({ state, verdict, verdict_current }) => state === 'accepted' && (verdict !== 'confirmed' || !verdict_current)).map(({ referee_name }) => `${referee_name}: give a verdict`),
  ]
  const missing = missingForEndorsement(facts)
  if (missing.includes('recheck-disjoint')) steps.push('the referees: a recheck does not meet the claim; object, or find the mistake')
  else if (missing.includes('recheck')) steps.push('a referee: recheck by other arithmetic or another method')
  if (missing.includes('estimate')) steps.push('a lead: an estimate that it rests on is in doubt; lift the doubt or return the claim')
  if (steps.length === 0 && missing.includes('confirmation')) steps.push('a lead: assign another referee')
  return steps.length === 0 ? 'the referees: complete the review' : steps.join('; ')
}
