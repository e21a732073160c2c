import { Router } from 'express'
import { importClaims, previewImport, textOfFile } from '../commands/import.ts'
import { may, signedInFor } from '../middleware/authenticate.ts'
import { uploadedFile } from './evidence-upload.ts'

/** A table of digits from a paper: looked at first, then taken in as drafts. */
export const imports = Router()

imports.post('/preview', signedInFor('draft'), may('research'), uploadedFile, async (req, res) => {
  res.json({ lines: await previewImport(textOfFile(req.file!.buffer)) })
})

imports.post('/', signedInFor('draft'), may('research'), uploadedFile, async (req, res) => {
  res.status(201).json(await importClaims(req.member, textOfFile(req.file!.buffer)))
})
