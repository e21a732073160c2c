import { Router } from 'express'
import { auditExportQuery, auditQuery } from '../../shared/schemas/group.ts'
import { may, signedIn } from '../middleware/authenticate.ts'
import { validate, type Validated } from '../middleware/validate.ts'
import { auditCsvHead, auditCsvLine } from '../presenters/audit.ts'
import { checkAudit, exportAudit, listAudit } from '../queries/audit.ts'

/** The audit trail of the lead's own group. */
export const audit = Router()

const list = { query: auditQuery }
const download = { query: auditExportQuery }

audit.use(signedIn, may('audit.read'))

audit.get('/', validate(list), async (req: Validated<typeof list>, res) => {
  res.json(await listAudit(req.member.groupId, req.input))
})

audit.get('/export', validate(download), async (req: Validated<typeof download>, res) => {
  const { format, ...filters } = req.input
  const csv = format === 'csv'
  res.type(csv ? 'text/csv' : 'application/x-ndjson').attachment(`audit-trail.${format}`)
  if (csv) res.write(auditCsvHead())
  for await (const entries of exportAudit(req.member.groupId, filters)) {
    res.write(entries.map((entry) => (csv ? auditCsvLine(entry) : `${JSON.stringify(entry)}\n`)).join(''))
  }
  res.end()
})

audit.get('/check', async (_req, res) => {
  res.json(await checkAudit())
})
