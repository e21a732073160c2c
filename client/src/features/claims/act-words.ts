import type { Act, ClaimState } from '../../../../shared/schemas/claim.ts'

/** What an act did, told after it is done; what happens next stands in the claim itself. */
export const DONE_WORDS: Record<Act, string> = {
  submit: 'Submitted. The leads of the group were told by e-mail.',
  assign: 'Assigned. The referee was told by e-mail.',
  remind: 'Reminded by e-mail.',
  accept: 'Accepted. The claim is yours to check.',
  decline: 'Declined. The lead was told, and can ask somebody else.',
  recheck: 'The recheck has begun.',
  object: 'Objection raised. The claim is returned to its author, who was told by e-mail.',
  answer: 'Answered. The referee was told by e-mail.',
  settle: 'Your word on the answer is recorded.',
  confirm: 'Confirmed.',
  return: 'Returned. The author was told by e-mail.',
  resubmit: 'Resubmitted for review.',
  sign: 'Signed. It is in the register, and its author was told by e-mail.',
  suspend: 'Suspended. Its author was told by e-mail.',
  reinstate: 'Reinstated.',
  withdraw: 'Withdrawn. Its author was told by e-mail.',
}

/** Acts that a lead does with a reason: what the dialog says will happen, and its button. */
export const REASONED_ACTS = {
  return: { ability: 'return', button: 'Return', tells: 'The claim goes back to its author, who can change and resubmit it. Once what it asserts has changed, confirmations given before no longer count.' },
  suspend: { ability: 'suspend', button: 'Suspend', tells: 'It stays in the register, marked as suspended, and no longer counts towards the best enclosure. The author and everyone whose claims rest on it are told.' },
  reinstate: { ability: 'reinstate', button: 'Reinstate', tells: 'It counts as signed again.' },
  withdraw: { ability: 'withdraw', button: 'Withdraw', tells: 'It can never be signed or reinstated afterwards. It stays readable under its number, marked as withdrawn.' },
} as const satisfies Partial<Record<Act, { ability: string; button: string; tells: string }>>
export type ReasonedAct = keyof typeof REASONED_ACTS

/** States in which a claim is public history and can no longer be changed. */
export function isSettled(state: ClaimState): boolean {
  return state === 'signed' || state === 'superseded' || state === 'suspended' || state === 'withdrawn'
}
