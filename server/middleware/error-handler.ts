import type { ErrorRequestHandler, RequestHandler } from 'express'
import { MulterError } from 'multer'
import { badRequest, internal, notFound, Problem, tooLarge, unavailable, unsupportedType } from '../errors.ts'
import { log } from '../log.ts'

/** An address under /api that no route knows. */
export const unknownAddress: RequestHandler = (req) => {
  throw notFound(`address ${req.method} ${req.baseUrl}${req.path}`)
}

/** What the body parsers and Express itself report, told in the words of a problem. */
function parserProblem(error: { status?: unknown; type?: unknown; limit?: unknown }): Problem | undefined {
  if (error.type === 'entity.parse.failed') return badRequest('malformed_json', 'The body is not JSON.')
  if (error.type === 'entity.too.large') return tooLarge(`The body is larger than ${Number(error.limit)} bytes.`)
  if (error.type === 'encoding.unsupported' || error.type === 'charset.unsupported') return unsupportedType('Send the body as UTF-8 JSON.')
  // From the file server: 403 is a path that leads out of its folder.
  if (error.status === 404 || error.status === 403) return notFound('file')
  if (typeof error.status === 'number' && error.status >= 400 && error.status < 500) return badRequest('malformed_request', 'The request is malformed.')
  return undefined
}

function uploadProblem(error: MulterError): Problem {
  return error.code === 'LIMIT_FILE_SIZE' ? tooLarge('The file is too large.') : badRequest('upload_refused', `The upload is refused: ${error.message}.`)
}

/** Sequelize wraps every lost or refused connection in one of these. */
const isOutage = (error: unknown): boolean => error instanceof Error && /^SequelizeConnection|^SequelizeHostNotReachable/.test(error.name)

/** What went wrong, in the words of a problem. */
export function toProblem(error: unknown): Problem {
  if (error instanceof Problem) return error
  if (error instanceof MulterError) return uploadProblem(error)
  if (isOutage(error)) return unavailable('The database does not answer. Nothing was changed; try again shortly.')
  return (error !== null && typeof error === 'object' && parserProblem(error)) || internal()
}

/** The one place where errors become answers. What is not a refusal is logged with its request id, and its text stays here. */
export const errorHandler: ErrorRequestHandler = (error, req, res, next) => {
  const problem = toProblem(error)
  if (problem.status >= 500) log.error({ err: error, requestId: req.id, method: req.method, path: req.path }, 'request failed')
  if (res.headersSent) {
    next(error)
    return
  }
  res.status(problem.status).set(problem.headers).set('Cache-Control', 'no-store').type('application/problem+json').send(JSON.stringify(problem.body(req.id)))
}
