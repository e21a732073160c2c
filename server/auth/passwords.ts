import bcrypt from 'bcryptjs'

/** 2^11 rounds: about a sixth of a second for the server, a lot for somebody who guesses. */
const COST = 11

/** Hash of no password that anyone has: compared when the account is unknown, so that the answer takes as long. */
const NOBODY = bcrypt.hashSync('', COST)

export const hashPassword = (password: string): Promise<string> => bcrypt.hash(password, COST)

/** Whether the password fits; for an unknown account (no hash) it takes as long and does not. */
export async function passwordFits(password: string, hash: string | undefined): Promise<boolean> {
  const fits = await bcrypt.compare(password, hash ?? NOBODY)
  return fits && hash !== undefined
}
