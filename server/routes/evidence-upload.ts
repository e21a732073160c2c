import type { RequestHandler } from 'express'
import multer from 'multer'
import { LIMITS } from '../../shared/limits.ts'
import { badRequest, invalidField, tooLarge } from '../errors.ts'

/** What a multipart body may have around its one file. */
const OVERHEAD = 16 * 1024
/** How long a client that is cut off may take to notice before its connection is broken. */
const LINGER_MS = 1_000

const oneFile = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: LIMITS.evidenceBytes, files: 1, fields: 4, fieldSize: 1024, parts: 6, headerPairs: 20 },
  // Without this, names arrive as Latin-1.
  defParamCharset: 'utf8',
}).single('file')

/**
 * Reads the one file of a multipart request into memory. One that says it is too large is refused unread; one that turns out to be is
 * cut off there, since multer by itself would read it to the end. Either way the connection ends with the answer.
 */
export const uploadedFile: RequestHandler = (req, res, next) => {
  const limit = LIMITS.evidenceBytes + OVERHEAD
  let received = 0
  let over = false
  const cutOff = (): void => {
    over = true
    res.set('Connection', 'close')
    res.on('finish', () => {
      // Whoever still sends is given a moment to read the answer.
      req.resume()
      setTimeout(() => req.socket.destroy(), LINGER_MS).unref()
    })
    next(tooLarge(`A file has at most ${LIMITS.evidenceBytes / 1024 / 1024} MB. Compress it, or upload the part that matters.`))
  }
  const count = (chunk: Buffer): void => {
    received += chunk.length
    if (received <= limit || over) return
    req.off('data', count).unpipe()
    cutOff()
  }

  if (Number(req.headers['content-length'] ?? 0) > limit) return cutOff()
  oneFile(req, res, (error: unknown) => {
    req.off('data', count)
    if (over) return
    if (error instanceof multer.MulterError && error.code === 'LIMIT_FILE_SIZE') return cutOff()
    if (error) return next(error instanceof multer.MulterError ? error : badRequest('malformed_upload', 'The upload is malformed, or was broken off.'))
    if (!req.file) return next(invalidField('file', 'is needed'))
    next()
  })
  req.on('data', count)
}
