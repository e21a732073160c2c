/**
 * Every page of the product: its address as a pattern, who it is for, and the words by which browsers, search engines and people
 * who share a link know it. The client's router and the server, which fills the head of each page, both go by this list.
 */

/** Open to everybody and to be found; open to whoever has the address, as sign-in and mailed links; for members. */
export type PageAccess = 'public' | 'unlisted' | 'members'

export interface Page {
  path: string
  access: PageAccess
  title: string
  /** One or two sentences for search engines and shared links. */
  description?: string
  /** Address that stands for this one, where it is another. */
  canonical?: string
}

/** What the product says of itself where a page has nothing closer to say. */
export const PRODUCT_DESCRIPTION = 'A register of certified numerical constants: enclosures, who says so, and on what they rest.'

const REGISTER = {
  access: 'public',
  title: 'Register of constants',
  description: 'Constants of explicit number theory with enclosures [lo, hi] whose every rounding goes outward: their certified digits, claims and certificates.',
} as const

/** Of two patterns that fit one address the earlier counts. */
export const PAGES = {
  home: { ...REGISTER, path: '/', canonical: '/register' },
  register: { ...REGISTER, path: '/register' },
  constant: { path: '/constants/:number', access: 'public', title: 'Constant' },
  runs: { path: '/runs', access: 'members', title: 'Runs' },
  newRun: { path: '/runs/new', access: 'members', title: 'New run' },
  run: { path: '/runs/:id', access: 'members', title: 'Run' },
  newClaim: { path: '/claims/new', access: 'members', title: 'New claim' },
  importDigits: { path: '/claims/import', access: 'members', title: 'Import a table of digits' },
  claim: { path: '/claims/:id', access: 'public', title: 'Claim' },
  desk: { path: '/desk', access: 'members', title: 'Desk' },
  estimates: {
    path: '/estimates',
    access: 'public',
    title: 'Estimates',
    description: 'Published explicit inequalities of prime number theory that tail bounds use: statement, range of validity, source, and the signed claims that rest on each.',
  },
  estimate: { path: '/estimates/:id', access: 'public', title: 'Estimate' },
  digitCheck: {
    path: '/digit-check',
    access: 'public',
    title: 'Digit check',
    description: 'Paste the digits of a manuscript: each is told as confirmed, refuted or undecided by an enclosure of the register, with the first wrong place pointed at.',
  },
  lookUp: {
    path: '/look-up',
    access: 'public',
    title: 'Look up digits',
    description: 'Paste leading digits and see which constants of the register they can stand for, nearest first, and at which place the others are ruled out.',
  },
  keys: { path: '/keys', access: 'public', title: 'Public keys', description: 'The public keys with which anybody can tell whether a certificate was signed by this register.' },
  verify: {
    path: '/verify',
    access: 'public',
    title: 'Verify a certificate',
    description: 'Your own browser checks a certificate and repeats its enclosure from the file alone; nothing of the file is sent.',
  },
  programs: { path: '/programs', access: 'public', title: 'For programs', description: 'Everything that these pages do, a program can do through the same addresses: the API operation by operation, with OpenAPI 3.1.' },
  about: {
    path: '/about',
    access: 'public',
    title: 'How it is certified',
    description: 'What an enclosure and its certificate promise, how they come about, who agrees to them, and what they do not promise.',
  },
  signIn: { path: '/sign-in', access: 'unlisted', title: 'Sign in' },
  forgotPassword: { path: '/password-reset', access: 'unlisted', title: 'Forgotten password' },
  passwordReset: { path: '/password-reset/:token', access: 'unlisted', title: 'New password' },
  invitation: { path: '/invitations/:token', access: 'unlisted', title: 'Invitation' },
  account: { path: '/account', access: 'members', title: 'Account' },
  group: { path: '/group', access: 'members', title: 'Group' },
  groupAudit: { path: '/group/audit', access: 'members', title: 'Audit trail' },
  groupMail: { path: '/group/mail', access: 'members', title: 'Outgoing mail' },
  groupKeys: { path: '/group/keys', access: 'members', title: 'Keys' },
  groupLeft: { path: '/left', access: 'unlisted', title: 'Left' },
} as const satisfies Record<string, Page>

export type PageName = keyof typeof PAGES
