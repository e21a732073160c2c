import { env } from '../env.ts'
import { escapeHtml } from '../html.ts'

/** What a template gives: words only. How a mail looks is decided here, once, for all of them. */
export interface MailContent {
  subject: string
  paragraphs: string[]
  /** Somebody's own words: a reason, an objection, a note. */
  quote?: string
  list?: string[]
  /** What the mail asks for, as a button; an address within the product, or a whole link. */
  action: { label: string; to: string }
  /** After the button. */
  closing?: string[]
}

export interface RenderedMail {
  subject: string
  text: string
  html: string
}

/** The colours of the client's day scheme; mail programs know no variables. */
const INK = '#1c1915'
const SOFT = '#595145'
const PAPER = '#f7f2e8'
const LEAF = '#fdfaf3'
const RULE = '#d3c9b5'
const LICHEN = '#3a5732'
const SERIF = "'Source Serif 4', 'Iowan Old Style', Georgia, 'Times New Roman', serif"

const FOOTER = 'Merestone sends this to people who work on claims of its register.'

const WIDTH = 76

/** Breaks a paragraph of plain text at words; a link stays whole. */
function wrap(text: string, indent = ''): string {
  return text
    .split('\n')
    .map((line) => {
      const rows = ['']
      for (const word of line.split(' ')) {
        const row = rows[rows.length - 1]!
        if (row !== '' && row.length + word.length + 1 > WIDTH - indent.length) rows.push(word)
        else rows[rows.length - 1] = row === '' ? word : `${row} ${word}`
      }
      return rows.map((row) => `${indent}${row}`.trimEnd()).join('\n')
    })
    .join('\n')
}

function renderText({ paragraphs, quote, list, closing }: MailContent, action: { label: string; link: string }): string {
  const blocks = [
    ...paragraphs.map((paragraph) => wrap(paragraph)),
    ...(quote === undefined ? [] : [wrap(quote, '> ')]),
    ...(list === undefined ? [] : [list.map((item) => `- ${wrap(item, '  ').trimStart()}`).join('\n')]),
    `${action.label}:\n${action.link}`,
    ...(closing ?? []).map((paragraph) => wrap(paragraph)),
    `--\n${wrap(FOOTER)}\n${env.publicUrl}`,
  ]
  return `${blocks.join('\n\n')}\n`
}

const paragraph = (text: string): string => `<p style="margin:0 0 16px">${escapeHtml(text).replace(/\n/g, '<br>')}</p>`

function renderHtml({ subject, paragraphs, quote, list, closing }: MailContent, action: { label: string; link: string }): string {
  const link = escapeHtml(action.link)
  const body = [
    ...paragraphs.map(paragraph),
    quote === undefined ? '' : `<blockquote style="margin:0 0 16px;padding:4px 0 4px 16px;border-left:3px solid ${LICHEN};white-space:pre-wrap">${escapeHtml(quote)}</blockquote>`,
    list === undefined ? '' : `<ul style="margin:0 0 16px;padding-left:22px">${list.map((item) => `<li style="margin:0 0 6px">${escapeHtml(item)}</li>`).join('')}</ul>`,
    `<p style="margin:24px 0"><a href="${link}" style="display:inline-block;padding:10px 18px;background:${LICHEN};color:${LEAF};text-decoration:none;border-radius:3px">${escapeHtml(action.label)}</a></p>`,
    `<p style="margin:0 0 16px;font-size:14px;color:${SOFT}">Or open this address: <a href="${link}" style="color:${LICHEN};word-break:break-all">${link}</a></p>`,
    ...(closing ?? []).map(paragraph),
  ]
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><meta name="color-scheme" content="light"><title>${escapeHtml(subject)}</title></head>
<body style="margin:0;padding:0;background:${PAPER}">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="background:${PAPER}"><tr><td align="center" style="padding:28px 14px">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="max-width:600px;font-family:${SERIF};font-size:17px;line-height:1.5;color:${INK}">
<tr><td style="padding:0 0 10px;border-bottom:1px solid ${INK};font-size:20px;font-weight:600;letter-spacing:.01em">Merestone</td></tr>
<tr><td style="padding:24px 0 8px"><h1 style="margin:0 0 18px;font-size:22px;line-height:1.3;font-weight:600">${escapeHtml(subject)}</h1>
${body.filter((block) => block !== '').join('\n')}
</td></tr>
<tr><td style="padding:12px 0 0;border-top:1px solid ${RULE};font-size:14px;color:${SOFT}">${escapeHtml(FOOTER)}</td></tr>
</table></td></tr></table></body></html>
`
}

/** Text and HTML of a mail, in the one look that all of them have. */
export function renderContent(content: MailContent): RenderedMail {
  // A subject is one line of a header, whatever a name in it holds.
  const subject = content.subject.replace(/\s+/g, ' ').trim()
  const { label, to } = content.action
  const action = { label, link: to.startsWith('/') ? env.publicUrl + to : to }
  return { subject, text: renderText(content, action), html: renderHtml({ ...content, subject }, action) }
}

/** A date for a mail, which does not know its reader's zone. */
export const mailDate = (iso: string): string => `${new Date(iso).toISOString().slice(0, 16).replace('T', ' ')} UTC`
