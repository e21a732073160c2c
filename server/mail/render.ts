import type { MailData, MailTemplate } from './catalogue.ts'

export interface RenderedMail {
  subject: string
  text: string
  html: string
}

/** Subject, text and HTML of a mail. */
export function renderMail<T extends MailTemplate>(template: T, data: MailData[T]): RenderedMail {
  return { subject: template, text: JSON.stringify(data), html: '' }
}
