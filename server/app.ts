import { join } from 'node:path'
import express, { type Express } from 'express'
import helmet from 'helmet'
import { env } from './env.ts'
import { csrf } from './middleware/csrf.ts'
import { errorHandler, unknownAddress } from './middleware/error-handler.ts'
import { rateLimit } from './middleware/rate-limit.ts'
import { requestLog } from './middleware/request-log.ts'
import { staticClient } from './middleware/static-client.ts'
import { pages } from './pages/pages.ts'
import { robots } from './pages/robots.ts'
import { projectRoot } from './project-root.ts'
import { api } from './routes/api.ts'
import { health } from './routes/health.ts'

/** Body of a JSON request at most; uploads go through multer and have their own limit. */
const JSON_LIMIT = '1mb'

interface AppOptions {
  /** Requests a minute from one address. */
  ratePerMinute?: number
  /** Where the built client lies. */
  clientFolder?: string
}

/** Builds the web application; whoever calls it decides where it listens. */
export function createApp({ ratePerMinute = env.RATE_LIMIT, clientFolder = join(projectRoot, 'dist', 'client') }: AppOptions = {}): Express {
  const app = express()
  app.disable('x-powered-by')
  app.set('trust proxy', env.TRUST_PROXY)
  app.set('etag', 'strong')

  app.use(requestLog)
  app.use(
    helmet({
      // KaTeX and the charts set styles on elements; scripts come from here only. Plain http on loopback must stay plain http.
      contentSecurityPolicy: { directives: { styleSrc: ["'self'", "'unsafe-inline'"], fontSrc: ["'self'", 'data:'], scriptSrc: ["'self'", "'wasm-unsafe-eval'"], workerSrc: ["'self'", 'blob:'], upgradeInsecureRequests: env.secureCookies ? [] : null } },
      strictTransportSecurity: env.secureCookies,
      referrerPolicy: { policy: 'same-origin' },
    }),
  )
  app.use('/health', health)
  app.use('/api/v1', rateLimit(ratePerMinute), csrf, express.json({ limit: JSON_LIMIT }), api())
  app.use('/api', unknownAddress)
  app.use(robots, staticClient(clientFolder), pages(join(clientFolder, 'index.html'), ratePerMinute))
  app.use(unknownAddress)
  app.use(errorHandler)
  return app
}
