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
  estimates: () => '/estimates',
  estimate: (id: string) => `/estimates/${id}`,
  group: (section = 'members') => `/group/${section}`,
  account: () => '/account',
  signIn: (returnTo?: string) => withSearch('/sign-in', { to: returnTo }),
  forgotPassword: () => '/password-reset',
  passwordReset: (token: string) => `/password-reset/${token}`,
  invitation: (token: string) => `/invitations/${token}`,
}

/** Files and streams of the server. */
export const files = {
  claimCertificate: (id: string) => `/api/v1/claims/${id}/certificate`,
  runCertificate: (id: string) => `/api/v1/runs/${id}/certificate`,
  runEvents: (id: string) => `/api/v1/runs/${id}/events`,
  evidence: (id: string) => `/api/v1/evidence/${id}`,
  auditExport: () => '/api/v1/audit/export',
}
