import { parseArgs } from 'node:util'
import { z } from 'zod'
import { shortText } from '../../shared/schemas/common.ts'
import { email } from '../../shared/schemas/member.ts'
import { connectToLocalDatabase } from './local-database.ts'

const USAGE = `create-lead: invites the first lead of a group, which is made if there is none of that name

  create-lead --group "Analytic number theory" --name "Full name" --email address

The link that is printed works once; the lead chooses a password there. It is mailed as well.`

const input = z.object({ group: shortText, name: shortText, email })

function readArguments() {
  const options = { group: { type: 'string' }, name: { type: 'string' }, email: { type: 'string' }, help: { type: 'boolean' } } as const
  try {
    const { values } = parseArgs({ options })
    const parsed = input.safeParse(values)
    if (!values.help && parsed.success) return parsed.data
    if (!values.help) console.error(parsed.error?.issues.map((issue) => `--${issue.path.join('.')}: ${issue.code === 'invalid_type' ? 'is needed' : issue.message}`).join('\n'))
  } catch (error) {
    console.error((error as Error).message)
  }
  console.error(USAGE)
  return undefined
}

const wanted = readArguments()
if (wanted) {
  const leave = await connectToLocalDatabase()
  const { sequelize } = await import('../db.ts')
  const { Problem } = await import('../errors.ts')
  const { bringUpToDate } = await import('../prepare-database.ts')
  const { inviteFirstLead } = await import('../commands/invitation.ts')
  try {
    await bringUpToDate()
    console.log(`Invitation for ${wanted.email}, open for seven days:\n${await inviteFirstLead(wanted)}`)
  } catch (error) {
    if (!(error instanceof Problem)) throw error
    console.error(error.message)
    process.exitCode = 1
  } finally {
    await sequelize.close()
    await leave()
  }
} else {
  process.exitCode = 2
}
