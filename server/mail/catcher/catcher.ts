import { createServer, type Server } from 'node:http'
import { SMTPServer } from 'smtp-server'
import { listPage, mailPage } from './pages.ts'
import { MailStore } from './store.ts'

const LOOPBACK = '127.0.0.1'
const MOST_BYTES = 5_000_000

export interface Catcher {
  smtpPort: number
  readerPort: number
  close(): Promise<void>
}

/**
 * A mail server for development: takes every mail over SMTP, keeps it in a folder, and shows it on a page. Addresses that begin with
 * "bounce" are refused, so that one can see what the product does then.
 */
export async function startCatcher({ folder, smtpPort, readerPort }: { folder: string; smtpPort: number; readerPort: number }): Promise<Catcher> {
  const store = new MailStore(folder)
  const smtp = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: MOST_BYTES,
    onRcptTo: ({ address }, _session, callback) =>
      address.startsWith('bounce') ? callback(Object.assign(new Error('No such mailbox'), { responseCode: 550 })) : callback(),
    onData: (stream, _session, callback) => {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('error', callback)
      stream.on('end', () => {
        if (stream.sizeExceeded) return callback(Object.assign(new Error('Message too large'), { responseCode: 552 }))
        store.add(Buffer.concat(chunks))
        callback()
      })
    },
  })
  // A client that breaks off is no reason to stop catching.
  smtp.on('error', () => undefined)
  const reader = createReader(store)
  const ports = { smtpPort: await listen(smtp.server as unknown as Server, smtpPort), readerPort: await listen(reader, readerPort) }
  return {
    ...ports,
    close: async () => {
      await new Promise<void>((resolve) => smtp.close(resolve))
      reader.closeAllConnections()
      await new Promise((resolve) => reader.close(resolve))
    },
  }
}

function listen(server: Server, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, LOOPBACK, () => resolve((server.address() as { port: number }).port))
  })
}

/** `/` and `/messages/:id` for people, `/messages.json` for tests. */
function createReader(store: MailStore): Server {
  return createServer((req, res) => {
    const send = (status: number, type: string, body: string) =>
      res
        .writeHead(status, { 'Content-Type': `${type}; charset=utf-8`, 'Cache-Control': 'no-store', 'X-Content-Type-Options': 'nosniff', 'Content-Security-Policy': "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'" })
        .end(body)
    const path = new URL(req.url ?? '/', `http://${LOOPBACK}`).pathname
    if (path === '/') return send(200, 'text/html', listPage(store.list()))
    if (path === '/messages.json') return send(200, 'application/json', JSON.stringify(store.list()))
    const [, id, html] = /^\/messages\/([\w-]+)(\/html)?$/.exec(path) ?? []
    const mail = id === undefined ? undefined : store.find(id)
    if (!mail) return send(404, 'text/plain', 'There is no such mail.')
    return html === undefined ? send(200, 'text/html', mailPage(mail)) : send(200, 'text/html', mail.html)
  })
}
