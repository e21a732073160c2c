import { escapeHtml } from '../../html.ts'
import type { StoredMail } from './store.ts'

const STYLE = `
  body { margin: 0 auto; max-width: 56rem; padding: 2rem 1.25rem; background: #faf7f0; color: #211f1b; font: 17px/1.5 "Source Serif 4", Georgia, serif }
  h1 { font-size: 1.4rem; font-weight: 600 } a { color: #47602c } table { border-collapse: collapse; width: 100% }
  td, th { text-align: left; vertical-align: top; padding: .4rem .75rem .4rem 0; border-bottom: 1px solid #d9d2c3 }
  iframe { width: 100%; height: 34rem; border: 1px solid #d9d2c3; background: #fff } pre { white-space: pre-wrap; overflow-wrap: anywhere; font-size: .85rem }
  @media (prefers-color-scheme: dark) { body { background: #1b1a17; color: #ece6d9 } a { color: #a9c187 } td, th, iframe { border-color: #454036 } }`

const page = (title: string, body: string): string =>
  `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escapeHtml(title)}</title><style>${STYLE}</style></head><body>${body}</body></html>`

/** The list of caught mails, newest first. */
export function listPage(mails: StoredMail[]): string {
  const rows = mails.map(
    ({ id, receivedAt, to, subject }) =>
      `<tr><td><time datetime="${receivedAt}">${receivedAt.slice(0, 19).replace('T', ' ')}</time></td><td>${escapeHtml(to)}</td><td><a href="/messages/${id}">${escapeHtml(subject)}</a></td></tr>`,
  )
  const table = `<table><thead><tr><th>Caught (UTC)</th><th>To</th><th>Subject</th></tr></thead><tbody>${rows.join('')}</tbody></table>`
  return page('Caught mail', `<h1>Mail caught on this machine</h1>${mails.length === 0 ? '<p>No mail yet. Every mail that Merestone sends here comes to this page and goes nowhere else.</p>' : table}`)
}

/** One mail: its HTML in a frame of its own, in which nothing runs, and its text. */
export function mailPage({ id, from, to, subject, receivedAt, text }: StoredMail): string {
  return page(
    subject,
    `<p><a href="/">All caught mail</a></p><h1>${escapeHtml(subject)}</h1>
     <p>From ${escapeHtml(from)}<br>To ${escapeHtml(to)}<br>${receivedAt}</p>
     <iframe sandbox="allow-popups allow-popups-to-escape-sandbox allow-top-navigation-by-user-activation" src="/messages/${id}/html" title="The mail as HTML"></iframe>
     <h2>As text</h2><pre>${escapeHtml(text)}</pre>`,
  )
}
