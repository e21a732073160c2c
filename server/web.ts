import { once } from 'node:events'
import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { createApp } from './app.ts'
import { sequelize } from './db.ts'
import { env } from './env.ts'
import { log } from './log.ts'

/** How long requests at work may take when the process is asked to end; event streams are cut then, and their clients reconnect. */
const GRACE_MS = 3_000

/** Serves the application until `shutdown`; `ready` is told the address that it listens on. */
export async function startWeb(shutdown: AbortSignal, ready: (address: string) => void): Promise<void> {
  const server = createServer(createApp())
  // A client that sends its request by drops does not hold a connection for ever.
  server.requestTimeout = 120_000
  server.headersTimeout = 20_000
  server.keepAliveTimeout = 65_000
  await listen(server)
  const { port } = server.address() as AddressInfo
  const address = `http://${env.HOST}:${port}`
  log.info({ address }, 'web process listens')
  ready(address)
  if (!shutdown.aborted) await once(shutdown, 'abort')
  await close(server)
  await sequelize.close()
}

function listen(server: Server): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) =>
      reject(error.code === 'EADDRINUSE' ? new Error(`Port ${env.PORT} of ${env.HOST} is taken by another program. Set PORT to a free one.`) : error),
    )
    server.listen(env.PORT, env.HOST, resolve)
  })
}

async function close(server: Server): Promise<void> {
  const closed = once(server, 'close')
  server.close()
  server.closeIdleConnections()
  const cut = setTimeout(() => server.closeAllConnections(), GRACE_MS)
  await closed
  clearTimeout(cut)
}
