import { recordAudit } from '../audit/record.ts'
import { change, inTransaction, selectOne } from '../db.ts'
import { conflict, notFound } from '../errors.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { mayResend } from '../policies/outbox.ts'
import { OUTBOX_COLUMNS, type OutboxRow } from '../queries/outbox.ts'

/** Writes a mail once more, as a new row; to the address that the member has now. */
export async function resendMail(actor: SignedInMember, id: string): Promise<OutboxRow> {
  return inTransaction(async (transaction) => {
    const mail = await selectOne<OutboxRow>(`SELECT ${OUTBOX_COLUMNS} FROM outbox WHERE id = $id AND group_id = $groupId FOR UPDATE`, { id, groupId: actor.groupId }, transaction)
    if (!mail) throw notFound('mail')
    if (!mayResend(mail)) throw conflict('not_resendable', 'This mail is still on its way, or holds a one-time link: send the invitation again, or have the person ask for a new link.')
    const [copy] = await change<OutboxRow>(
      `INSERT INTO outbox (group_id, member_id, recipient_name, recipient_email, template, subject, text, html, resent_from)
       SELECT o.group_id, o.member_id, coalesce(m.name, o.recipient_name), coalesce(m.email, o.recipient_email), o.template, o.subject, o.text, o.html, o.id
       FROM outbox o LEFT JOIN members m ON m.id = o.member_id WHERE o.id = $id
       RETURNING ${OUTBOX_COLUMNS}`,
      { id },
      transaction,
    )
    await recordAudit(transaction, {
      act: 'mail.resend',
      actorId: actor.id,
      groupId: actor.groupId,
      subject: { kind: 'mail', id, label: mail.subject },
      detail: { to: mail.recipient_email },
    })
    return copy!
  })
}
