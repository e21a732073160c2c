/** Every address of the client, and of the files it links to, is written here and nowhere else. */

type Search = Record<string, string | number | undefined>

function withSearch(path: string, search: Search): string {
  const entries = Object.entries(search).filter((entry): entry is [string, string | number] => entry[1] !== undefined && entry[1] !== '')
  return entries.length === 0 ? path : `${path}?${new URLSearchParams(entries.map(([key, value]) => [key, String(value)]))}`
}

/** MST-0042/1 as it stands in an address; a claim without a number is addressed by its id. */
function claimSlug(claim: { id: string; number: string | null } | string): string {
  if (typeof claim === 'string') return claim.replace('/', '-')
  return claim.number?.replace('/', '-') ?? claim.id
}

export const paths = {
  home: () => '/',
  register: (search: Search = {}) => withSearch('/register', search),
  constant: (number: string) => `/constants/${number}`,
  runs: (search: Search = {}) => withSearch('/runs', search),
  newRun: (search: Search = {}) => withSearch('/runs/new', search),
  run: (id: string) => `/runs/${id}`,
  newClaim: (search: Search = {}) => withSearch('/claims/new', search),
  claim: (claim: { id: string; number: string | null } | string) => `/claims/${claimSlug(claim)}`,
  desk: () => '/desk',
  digitCheck: (search: Search = {}) => withSearch('/digit-check', search),
  lookUp: (search: Search = {}) => withSearch('/look-up', search),
  estimates: (search: Search = {}) => withSearch('/estimates', search),
  estimate: (id: string) => `/estimates/${id}`,
  group: () => '/group',
  groupAudit: (search: Search = {}) => withSearch('/group/audit', search),
  groupMail: (search: Search = {}) => withSearch('/group/mail', search),
  groupKeys: () => '/group/keys',
  groupLeft: () => '/left',
  keys: () => '/keys',
  verify: () => '/verify',
  about: () => '/about',
  programs: () => '/programs',
  importDigits: () => '/claims/import',
  account: () => '/account',
  signIn: (returnTo?: string) => withSearch('/sign-in', { to: returnTo }),
  forgotPassword: () => '/password-reset',
  passwordReset: (token: string) => `/password-reset/${token}`,
  invitation: (token: string) => `/invitations/${token}`,
}

/** Files and streams of the server. */
export const files = {
  apiDocument: () => '/api/v1/openapi.json',
  claimCertificate: (id: string) => `/api/v1/claims/${id}/certificate`,
  runCertificate: (id: string) => `/api/v1/runs/${id}/certificate`,
  runEvents: (id: string) => `/api/v1/runs/${id}/events`,
  constantExport: (search: Search) => withSearch('/api/v1/constants/export', search),
  evidence: (id: string) => `/api/v1/evidence/${id}`,
  auditExport: (search: Search = {}) => withSearch('/api/v1/audit/export', search),
  key: (id: string) => `/api/v1/keys/${id}.pem`,
}
