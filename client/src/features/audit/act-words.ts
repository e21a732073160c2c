/** Acts of the trail in words; the trail itself keeps the short names, and one that has no words here is shown as it is. */
const ACTS: Record<string, string> = {
  'access-token.create': 'made the access token',
  'access-token.revoke': 'revoked the access token',
  'claim.accept': 'accepted to referee',
  'claim.answer': 'answered an objection',
  'claim.assign': 'assigned a referee to',
  'claim.attach': 'added evidence to',
  'claim.confirm': 'confirmed',
  'claim.create': 'wrote a',
  'claim.decline': 'declined to referee',
  'claim.delete': 'deleted the',
  'claim.detach': 'removed evidence from',
  'claim.edit': 'edited',
  'claim.endorse': 'endorsed',
  'claim.object': 'objected to',
  'claim.recheck': 'started a recheck of',
  'claim.reinstate': 'reinstated',
  'claim.remind': 'reminded of',
  'claim.await-referee': 'waits again for a referee:',
  'claim.draft-verdict': 'drafted a verdict on',
  'claim.restore': 'restored',
  'claim.resubmit': 'resubmitted',
  'claim.return': 'returned',
  'claim.settle': 'settled an objection to',
  'claim.sign': 'signed',
  'claim.submit': 'submitted',
  'claim.supersede': 'superseded',
  'claim.suspend': 'suspended',
  'claim.uphold': 'upheld an objection to',
  'claim.withdraw': 'withdrew',
  'constant.state': 'stated',
  'estimate.doubt': 'marked as in doubt',
  'estimate.lift-doubt': 'lifted the doubt about',
  'group.create': 'founded the group',
  'group.rules': 'changed the rules of',
  'invitation.accept': 'accepted the invitation',
  'invitation.create': 'invited',
  'invitation.resend': 'sent again the invitation of',
  'invitation.revoke': 'took back the invitation of',
  'invitation.send': 'invited',
  'key.change': 'changed the signing key to',
  'mail.resend': 'sent again the mail',
  'member.join': 'made a member of',
  'member.leave': 'ended the membership of',
  'member.rename': 'renamed',
  'member.roles': 'changed the roles of',
  'password.change': 'changed the password of',
  'password.reset': 'set by a mailed link the password of',
  'run.recheck': 'started a recheck of',
  'run.resume': 'resumed a run of',
  'run.start': 'started a run of',
  'run.stop': 'stopped a run of',
}

/** Acts that a member does to their own account. */
const OWN_ACTS: Record<string, string> = {
  'invitation.accept': 'accepted the invitation',
  'member.join': 'joined the group',
  'member.leave': 'left the group',
  'member.rename': 'changed their name',
  'member.roles': 'changed their own roles',
  'password.change': 'changed their password',
  'password.reset': 'set a new password by a mailed link',
}

/** Starts of acts that the filter offers: each finds all acts that begin with it. */
export const ACT_FAMILIES: Record<string, string> = {
  'claim.': 'on claims',
  'claim.sign': 'signing',
  'claim.suspend': 'suspending',
  'claim.withdraw': 'withdrawing',
  'run.': 'on runs',
  'estimate.': 'on estimates',
  'member.': 'on members',
  'invitation.': 'on invitations',
  'group.': 'on the rules',
  'mail.': 'on mails',
  'password.': 'on passwords',
  'access-token.': 'on access tokens',
}

/** What was done, in words. `own`: to the account of whoever did it, which then needs no naming. */
export function actWords(act: string, own: boolean): { words: string; names: boolean } {
  const ownWords = own ? OWN_ACTS[act] : undefined
  return ownWords === undefined ? { words: ACTS[act] ?? act, names: true } : { words: ownWords, names: false }
}
