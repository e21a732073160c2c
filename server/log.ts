import { pino } from 'pino'
import { env } from './env.ts'

/** The program's log, JSON lines on standard output. Secrets never reach it: what could hold one is named here. */
export const log = pino({
  level: env.LOG_LEVEL,
  base: { pid: process.pid },
  redact: ['req.headers.cookie', 'req.headers.authorization', '*.password', '*.token'],
})
