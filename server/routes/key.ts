import { Router } from 'express'
import { notFound } from '../errors.ts'
import { publicKeys } from '../keys.ts'

/** Public keys of the installation, for whoever verifies a certificate. Open to everybody. */
export const key = Router()

key.get('/', (_req, res) => {
  res.json({ items: publicKeys() })
})

/** One key as a PEM file, for `verify --key`. */
key.get('/:id.pem', (req, res) => {
  const found = publicKeys().find(({ id }) => id === req.params.id)
  if (!found) throw notFound('key')
  res.type('application/x-pem-file').set('Content-Disposition', `attachment; filename="${found.id}.pem"`).send(found.pem)
})
