import type { RequestHandler } from 'express'
import multer from 'multer'
import { LIMITS } from '../../shared/limits.ts'
import { invalidField, tooLarge } from '../errors.ts'

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

const refusal = () => tooLarge(`A file has at most ${LIMITS.evidenceBytes / 1024 / 1024} MB. Compress it, or upload the part that matters.`)

/**
 * Reads the one file of a multipart request into memory. One that says it is too large is refused unread; one that turns out to be is
 * cut off there. Either way the connection ends with the answer, so that nobody sends a gigabyte for nothing.
 */
export const uploadedFile: RequestHandler = (req, res, next) => {
  if (Number(req.headers['content-length'] ?? 0) > LIMITS.evidenceBytes + OVERHEAD) {
    cutOff()
    return next(refusal())
  }
  oneFile(req, res, (error: unknown) => {
    if (error instanceof multer.MulterError && error.code === 'LIMIT_FILE_SIZE') {
      cutOff()
      return next(refusal())
    }
    if (error) return next(error)
    if (!req.file) return next(invalidField('file', 'is needed'))
    next()
  })

  function cutOff(): void {
    res.set('Connection', 'close')
    res.on('finish', () => {
      req.resume()
      setTimeout(() => req.socket.destroy(), LINGER_MS).unref()
    })
  }
}
