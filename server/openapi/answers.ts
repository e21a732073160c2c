import { z } from 'zod'
import { certificateSchema } from '../../shared/schemas/certificate.ts'
import { act, claim, claimPage, desk, digitCheck, evidence, type Act } from '../../shared/schemas/claim.ts'
import { constant, constantPage, lookUpResult } from '../../shared/schemas/constant.ts'
import { estimate, estimateDoubt, liftResult } from '../../shared/schemas/estimate.ts'
import { auditCheck, auditPage, group, outboxItem, outboxPage, publicKeyList } from '../../shared/schemas/group.ts'
import { importPreview, importResult } from '../../shared/schemas/import.ts'
import { account, invitation, invitationList, invitationOffer, member, memberList } from '../../shared/schemas/member.ts'
import { plan, run, runPage } from '../../shared/schemas/run.ts'
import { accessTokenCreated, accessTokenList, ownSessionList, passwordResetOffer, session } from '../../shared/schemas/session.ts'

/** What a route is for and what it answers when all is well. */
export interface Answer {
  /** The operation's name for programs. */
  name: string
  summary: string
  status: 200 | 201 | 202 | 204
  /** A schema, a media type for what is no JSON, or null for no body. */
  body: z.ZodType | string | null
  /** The field of the file, where one is uploaded. */
  upload?: string
}

const answer = (name: string, summary: string, body: Answer['body'], status: Answer['status'] = body === null ? 204 : 200, upload?: string): Answer => ({
  name, summary, body, status, ...(upload && { upload }),
})

const ACT_SUMMARIES: Record<Act, string> = {
  submit: 'Submit a draft for review',
  assign: 'Ask a member to referee the claim',
  remind: 'Remind a referee',
  accept: 'Accept to referee',
  decline: 'Decline to referee, with a reason',
  recheck: 'Have the constant enclosed once more by other arithmetic or another method',
  object: 'Object: the claim returns to its author',
  answer: 'Answer an objection',
  settle: 'Settle or uphold an objection after its answer',
  confirm: 'Confirm the claim as it stands',
  return: 'Return the claim to its author',
  resubmit: 'Put a returned claim back into review',
  sign: 'Sign the claim into the register; needs the password again',
  suspend: 'Suspend a signed claim',
  reinstate: 'Lift a suspension',
  withdraw: 'Withdraw the claim',
}

const acts = Object.fromEntries((Object.keys(act) as Act[]).map((name) => [`POST /claims/:id/${name}`, answer(`${name}Claim`, ACT_SUMMARIES[name], claim)]))

/** One entry a route; a route without one, or an entry without a route, fails the tests. */
export const ANSWERS: Record<string, Answer> = {
  'GET /session': answer('whoAmI', 'Who is signed in, with rights and counts', session),
  'POST /session': answer('signIn', 'Sign in', session),
  'DELETE /session': answer('signOut', 'Sign out', null),
  'GET /sessions': answer('listSessions', 'Own sessions', ownSessionList),
  'DELETE /sessions/:id': answer('endSession', 'End one of the own sessions', null),
  'PUT /password': answer('changePassword', 'Change the own password; ends the other sessions', null),
  'POST /password-resets': answer('askPasswordReset', 'Have a link mailed that sets a new password', z.object({}), 202),
  'GET /password-resets/:token': answer('readPasswordReset', 'Whether the link of a mail still serves', passwordResetOffer),
  'POST /password-resets/:token': answer('resetPassword', 'Set a new password by the link of a mail', null),
  'GET /invitations/accept/:token': answer('readInvitation', 'What an invitation offers', invitationOffer),
  'POST /invitations/accept/:token': answer('acceptInvitation', 'Accept an invitation and sign in', session, 201),
  'GET /invitations': answer('listInvitations', 'Invitations of the group', invitationList),
  'POST /invitations': answer('invite', 'Invite a person by e-mail', invitation, 201),
  'POST /invitations/:id/resend': answer('resendInvitation', 'Mail an invitation again', invitation),
  'DELETE /invitations/:id': answer('revokeInvitation', 'Revoke an invitation', null),
  'GET /group': answer('readGroup', 'The own group and its rules', group),
  'PATCH /group': answer('changeRules', 'Change the rules of the group', group),
  'GET /group/members': answer('listMembers', 'Members of the group', memberList),
  'PATCH /group/members/:id': answer('changeRoles', 'Give or take roles', member),
  'DELETE /group/members/:id': answer('removeMember', 'End a membership; the name stays on what was signed', null),
  'POST /group/departure': answer('leaveGroup', 'Leave the group', null),
  'GET /account': answer('readAccount', 'The own account', account),
  'PATCH /account': answer('changeAccount', 'Change name or mail preferences', account),
  'GET /access-tokens': answer('listTokens', 'Own access tokens', accessTokenList),
  'POST /access-tokens': answer('createToken', 'Make an access token; it is shown this once', accessTokenCreated, 201),
  'DELETE /access-tokens/:id': answer('revokeToken', 'Revoke an access token', null),
  'GET /audit': answer('listAudit', 'The audit trail of the group', auditPage),
  'GET /audit/export': answer('exportAudit', 'The audit trail as CSV or JSON lines', 'text/csv'),
  'GET /audit/check': answer('checkAudit', 'Recompute the chain of the audit trail', auditCheck),
  'GET /outbox': answer('listMails', 'Mails of the group and their fate', outboxPage),
  'POST /outbox/:id/resend': answer('resendMail', 'Send a mail again', outboxItem, 201),
  'GET /keys': answer('listKeys', "The installation's public keys", publicKeyList),
  'GET /keys/:id.pem': answer('readKey', 'A public key as PEM', 'application/x-pem-file'),
  'POST /plans': answer('plan', 'What would be computed: reading of the definition, and a forecast for every method', plan),
  'GET /runs': answer('listRuns', 'Runs of the group', runPage),
  'POST /runs': answer('startRun', 'Start a run; states the constant where it is new', run, 201),
  'GET /runs/:id': answer('readRun', 'A run with its outcome', run),
  'GET /runs/:id/events': answer('followRun', 'Progress of a run as server-sent events', 'text/event-stream'),
  'POST /runs/:id/stop': answer('stopRun', 'Stop a run', run),
  'POST /runs/:id/resume': answer('resumeRun', 'Go on with a stopped or failed run', run),
  'GET /runs/:id/certificate': answer('readRunCertificate', 'The certificate of a run', certificateSchema),
  'GET /estimates': answer('listEstimates', 'The library of published estimates', z.object({ items: z.array(estimate) })),
  'GET /estimates/:id': answer('readEstimate', 'A published estimate and what rests on it', estimate),
  'GET /estimates/:id/doubt': answer('readEstimateDoubt', 'All that rests on an estimate in the own group, and its doubt', estimateDoubt),
  'POST /estimates/:id/doubt': answer('markInDoubt', 'Mark an estimate as in doubt; suspends what rests on it', estimateDoubt, 201),
  'POST /estimates/:id/doubt/lift': answer('liftDoubt', 'Lift the doubt about an estimate and reinstate claims', liftResult),
  'GET /constants': answer('listConstants', 'The register, filtered and sorted', constantPage),
  'GET /constants/export': answer('exportConstants', 'What is filtered as CSV, JSON, BibTeX or a LaTeX table', 'text/csv'),
  'POST /constants': answer('stateConstant', 'State a constant; one that exists is answered as it is', constant, 201),
  'GET /constants/:number': answer('readConstant', 'A constant with its claims', constant),
  'POST /look-ups': answer('lookUpDigits', 'Constants that pasted digits are compatible with, nearest first', lookUpResult),
  'GET /claims': answer('listClaims', 'Claims, filtered', claimPage),
  'POST /claims': answer('draftClaim', 'Draft a claim', claim, 201),
  'GET /claims/:id': answer('readClaim', 'A claim with everything about it', claim),
  'PATCH /claims/:id': answer('editClaim', 'Edit a draft or a returned claim', claim),
  'DELETE /claims/:id': answer('deleteDraft', 'Delete a draft that was never submitted', null),
  'PUT /claims/:id/verdict-draft': answer('keepVerdictDraft', 'Keep a private draft of the own verdict', null),
  'GET /claims/:id/certificate': answer('readClaimCertificate', 'The certificate of a claim, with an ETag', certificateSchema),
  ...acts,
  'POST /claims/:id/evidence': answer('attachEvidence', 'Upload a file in support of a draft', evidence, 201, 'file'),
  'GET /evidence/:id': answer('readEvidence', 'A file of evidence', 'application/octet-stream'),
  'DELETE /evidence/:id': answer('removeEvidence', 'Remove a file from a draft', null),
  'POST /imports/preview': answer('previewImport', 'What a CSV table of digits would bring, line by line', importPreview, 200, 'file'),
  'POST /imports': answer('importDigits', 'Draft a claim for every readable line of a CSV table of digits', importResult, 201, 'file'),
  'POST /digit-checks': answer('checkDigits', 'Hold pasted digits against a claim, a constant or an enclosure', digitCheck),
  'GET /desk': answer('readDesk', 'What waits for me, by role', desk),
}
