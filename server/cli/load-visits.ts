import type { Right } from '../../shared/permissions.ts'
import { pick, type Roll } from './load-definitions.ts'
import type { Facts } from './load-facts.ts'

/** What one reader knows of their own: taken from the server after signing in. */
export interface Own {
  name: string
  runs: string[]
  claims: string[]
  /** Cursors that lie deep in a list, by the list's address. */
  cursors: Map<string, string>
}

export interface Asked {
  path: string
  body?: object
}

/** One way of asking one route, by a part of the readers. */
export interface Visit {
  /** As the routers have it: "GET /constants". */
  route: string
  what: string
  /** Who asks: everybody, those who are signed in, or those with a right. */
  by: 'anyone' | 'member' | Right
  ask: (facts: Facts, own: Own, roll: Roll) => Asked
}

/** Lists that are also entered deep inside, by a cursor. */
export const DEEP_LISTS: readonly { path: string; by: Visit['by'] }[] = [
  ...['number', 'digits', 'value', 'changed', 'k'].flatMap((sort) => ['asc', 'desc'].map((order) => ({ path: `/constants?sort=${sort}&order=${order}`, by: 'anyone' as const }))),
  { path: '/constants?text=almost+primes', by: 'anyone' },
  { path: '/constants?k=2&sort=digits&order=desc', by: 'anyone' },
  { path: '/claims?', by: 'anyone' },
  { path: '/claims?state=signed', by: 'anyone' },
  { path: '/runs?', by: 'group-work.read' },
  { path: '/audit?', by: 'audit.read' },
  { path: '/audit?act=claim.sign', by: 'audit.read' },
  { path: '/outbox?', by: 'outbox.manage' },
]

/** Filters and sortings of the register, one at a time and together. */
const REGISTER: [what: string, query: string | ((facts: Facts, roll: Roll) => string)][] = [
  ['first page', ''],
  ...['number', 'digits', 'value', 'changed', 'k'].flatMap((sort) => ['asc', 'desc'].map((order): [string, string] => [`sort ${sort} ${order}`, `sort=${sort}&order=${order}`])),
  ['set', (_facts, roll) => `set=${pick(roll, ['primes', 'almost-primes', 'residue-class', 'integers', 'smooth', 'over-primes'])}`],
  ['k', (_facts, roll) => `k=${1 + roll(20)}`],
  ['set and k', (_facts, roll) => `set=squarefree-almost-primes&k=${2 + roll(11)}`],
  ['weight', (_facts, roll) => `power=${pick(roll, ['1', '3/2', '2', '21/4'])}&logPower=${pick(roll, ['1', '0', '1/2', '3'])}`],
  ['power alone', 'power=7/4'],
  ['exclude 2', 'exclude=2'],
  ['exclude none', 'exclude=none'],
  ['exclude a few', 'exclude=3,7'],
  ['state', (_facts, roll) => `state=${pick(roll, ['stated', 'signed', 'superseded', 'suspended', 'withdrawn'])}`],
  ['state, by value', (_facts, roll) => `state=${pick(roll, ['signed', 'suspended'])}&sort=value`],
  ['digits at least', (_facts, roll) => `minDigits=${pick(roll, [10, 50, 100, 250])}`],
  ['digits at least, by change', (_facts, roll) => `minDigits=${pick(roll, [10, 50, 100, 250])}&sort=changed&order=desc`],
  ['group', ({ groups }, roll) => `group=${pick(roll, groups)}`],
  ['group, by digits', ({ groups }, roll) => `group=${pick(roll, groups)}&sort=digits&order=desc`],
  ['k, by value', (_facts, roll) => `k=${1 + roll(20)}&sort=value&order=desc`],
  ['everything at once', ({ groups }, roll) => `set=almost-primes&k=${2 + roll(6)}&exclude=2&state=signed&minDigits=20&group=${pick(roll, groups)}&sort=changed&order=desc`],
  ['nothing fits', 'set=smooth&exclude=2,3,5,7,11,13&minDigits=200&sort=digits'],
  ['text: broad word', (_facts, roll) => `text=${pick(roll, ['primes', 'prime+factors', 'squarefree', 'integers'])}`],
  ['text: broad word, by change', 'text=almost+primes&sort=changed&order=desc'],
  ['text: broad word, by value', 'text=primes&sort=value'],
  ['text: word of a few', (_facts, roll) => `text=modulo+${3 + roll(60)}`],
  ['text: rare word, by digits', 'text=euler+product&sort=digits&order=desc'],
  ['text: unknown word', 'text=unheard+of'],
  ['text: odd, k = 3', 'text=odd,+k+%3D+3'],
  ['text: 1/(p log p)', 'text=1/(p+log+p)'],
  ['text: 1/(n log^2 n), squarefree', 'text=1/(n+log^2+n),+squarefree'],
  ['text: number', ({ constants }, roll) => `text=${pick(roll, constants)}`],
  ['text: 1.6366', 'text=1.6366'],
  ['text: leading digits, few', (_facts, roll) => `text=${pick(roll, ['1.0', '0.5', '1.6', '2.7'])}`],
  ['text: leading digits, few, by change', 'text=1.0&sort=changed&order=desc'],
  ['text: leading digits, many', ({ digits }, roll) => `text=${pick(roll, digits)}`],
  ['text: digits and a word', 'text=1.00,+odd,+squarefree'],
]

const get = (route: string, what: string, by: Visit['by'], ask: (facts: Facts, own: Own, roll: Roll) => string): Visit => ({ route: `GET ${route}`, what, by, ask: (...given) => ({ path: ask(...given) }) })
const lookUp = (what: string, text: (facts: Facts, roll: Roll) => string): Visit => ({ route: 'POST /look-ups', what, by: 'anyone', ask: (facts, _own, roll) => ({ path: '/look-ups', body: { text: text(facts, roll), reading: pick(roll, ['truncated', 'rounded']) } }) })

const someWeek = (roll: Roll): string => {
  const month = `202${1 + roll(4)}-0${1 + roll(9)}`
  return `from=${month}-01T00:00:00Z&to=${month}-08T00:00:00Z`
}

/** Pages of one thing, made of many questions, and what a page of a member begins with: no lists, filters or look-ups. */
export const PAGES: ReadonlySet<string> = new Set([
  'GET /constants/:number', 'GET /claims/:id', 'GET /claims/:id/certificate', 'GET /evidence/:id', 'GET /estimates/:id', 'GET /estimates/:id/doubt', 'GET /runs/:id',
  'GET /runs/:id/events', 'GET /runs/:id/certificate', 'GET /invitations/accept/:token', 'GET /group', 'GET /account', 'GET /session', 'GET /desk',
])

/** Every list, filter, page and look-up that the routes offer. */
export const VISITS: readonly Visit[] = [
  ...REGISTER.map(([what, query]) => get('/constants', what, 'anyone', (facts, _own, roll) => `/constants?${typeof query === 'string' ? query : query(facts, roll)}`)),
  get('/constants', '100 a page', 'anyone', () => '/constants?limit=100'),
  ...DEEP_LISTS.map(({ path, by }) => get(path.split('?')[0]!, `deep page${path.endsWith('?') ? '' : `, ${path.split('?')[1]}`}`, by, (_facts, { cursors }) => `${path}&cursor=${cursors.get(path) ?? ''}`)),
  get('/constants/:number', 'page of a constant', 'anyone', ({ constants }, _own, roll) => `/constants/${pick(roll, constants)}`),
  lookUp('4 digits', ({ digits }, roll) => pick(roll, digits).slice(0, 6)),
  lookUp('9 digits', ({ digits }, roll) => pick(roll, digits).slice(0, 11)),
  lookUp('all digits known', ({ digits }, roll) => pick(roll, digits)),
  lookUp('two digits, very many fit', () => '1.0'),
  lookUp('next to nothing', (_facts, roll) => `${40 + roll(50)}.25`),
  { route: 'POST /digit-checks', what: 'against a constant', by: 'anyone', ask: ({ constants, digits }, _own, roll) => ({ path: '/digit-checks', body: { against: { constant: pick(roll, constants) }, text: pick(roll, digits), reading: 'truncated' } }) },
  { route: 'POST /digit-checks', what: 'against a claim', by: 'anyone', ask: ({ claims, digits }, _own, roll) => ({ path: '/digit-checks', body: { against: { claim: pick(roll, claims) }, text: pick(roll, digits), reading: 'truncated' } }) },
  get('/claims', 'first page', 'anyone', () => '/claims?'),
  ...['draft', 'submitted', 'in-review', 'endorsed', 'signed', 'superseded', 'suspended', 'withdrawn'].map((state) => get('/claims', `state ${state}`, 'anyone', () => `/claims?state=${state}`)),
  get('/claims', 'of a constant', 'anyone', ({ constants }, _own, roll) => `/claims?constant=${pick(roll, constants)}`),
  get('/claims', 'own', 'member', () => '/claims?mine=true'),
  get('/claims', 'own drafts', 'member', () => '/claims?mine=true&state=draft'),
  get('/claims/:id', 'page of a claim', 'anyone', ({ claims }, _own, roll) => `/claims/${pick(roll, claims)}`),
  get('/claims/:id', 'page of a claim at work', 'group-work.read', (_facts, { claims }, roll) => `/claims/${pick(roll, claims)}`),
  get('/claims/:id/certificate', 'file', 'anyone', ({ claims }, _own, roll) => `/claims/${pick(roll, claims)}/certificate`),
  get('/evidence/:id', 'file', 'anyone', ({ evidence }, _own, roll) => `/evidence/${pick(roll, evidence)}`),
  get('/estimates', 'all, with their uses', 'anyone', () => '/estimates'),
  get('/estimates/:id', 'one, with 500 uses', 'anyone', ({ estimates }, _own, roll) => `/estimates/${pick(roll, estimates)}`),
  get('/estimates/:id/doubt', 'what rests on it in the group', 'estimates.doubt', ({ estimates }, _own, roll) => `/estimates/${pick(roll, estimates)}/doubt`),
  get('/session', 'who am I, and counts', 'anyone', () => '/session'),
  get('/keys', 'keys', 'anyone', () => '/keys'),
  get('/invitations/accept/:token', 'an invitation', 'anyone', ({ invitation }) => `/invitations/accept/${invitation}`),
  get('/desk', 'what waits', 'member', () => '/desk'),
  ...['', 'mine=true', 'state=done', 'state=failed', 'mine=true&state=running'].map((query) => get('/runs', query === '' ? 'first page' : query, 'member', () => `/runs?${query}`)),
  get('/runs', 'of a constant', 'member', ({ constants }, _own, roll) => `/runs?constant=${pick(roll, constants)}`),
  get('/runs/:id', 'page of a run', 'group-work.read', (_facts, { runs }, roll) => `/runs/${pick(roll, runs)}`),
  get('/runs/:id/events', 'of a run that is done', 'group-work.read', (_facts, { runs }, roll) => `/runs/${pick(roll, runs)}/events`),
  get('/runs/:id/certificate', 'file', 'group-work.read', (_facts, { runs }, roll) => `/runs/${pick(roll, runs)}/certificate`),
  get('/group', 'rules', 'member', () => '/group'),
  get('/group/members', 'members', 'member', () => '/group/members'),
  get('/account', 'account', 'member', () => '/account'),
  get('/sessions', 'sessions', 'member', () => '/sessions'),
  get('/access-tokens', 'tokens', 'member', () => '/access-tokens'),
  get('/invitations', 'invitations', 'members.manage', () => '/invitations'),
  ...['', 'state=bounced', 'state=waiting'].map((query) => get('/outbox', query === '' ? 'first page' : query, 'outbox.manage', () => `/outbox?${query}`)),
  get('/audit', 'first page', 'audit.read', () => '/audit?'),
  ...['claim', 'claim.sign', 'constant.state'].map((act) => get('/audit', `act ${act}`, 'audit.read', () => `/audit?act=${act}`)),
  get('/audit', 'subject kind', 'audit.read', () => '/audit?subjectKind=constant'),
  get('/audit', 'of a claim', 'audit.read', (_facts, { claims }, roll) => `/audit?subjectKind=claim&subjectId=${pick(roll, claims)}`),
  get('/audit', 'a week long ago', 'audit.read', (_facts, _own, roll) => `/audit?${someWeek(roll)}`),
  get('/audit', 'before a day', 'audit.read', (_facts, _own, roll) => `/audit?to=202${2 + roll(3)}-0${1 + roll(9)}-08T00:00:00Z`),
  get('/audit', 'text: a number', 'audit.read', ({ claims }, _own, roll) => `/audit?text=${pick(roll, claims).slice(0, -2)}`),
  get('/audit', 'text: a name', 'audit.read', (_facts, { name }) => `/audit?text=${encodeURIComponent(name)}`),
  get('/audit', 'text: nothing fits', 'audit.read', () => '/audit?text=unheard+of'),
]

const FORMATS = ['csv', 'json', 'bibtex', 'latex'] as const

/** Exports, which are sent page by page between the answers to others, and have no end to wait for with a finger on the key: asked for one at a time, after the readers. */
export const EXPORTS: readonly Visit[] = [
  ...FORMATS.map((format) => get('/constants/export', `some hundred rows, ${format}`, 'anyone', (_facts, _own, roll) => `/constants/export?format=${format}&set=squarefree-almost-primes&k=${2 + roll(11)}&minDigits=40`)),
  get('/audit/export', 'a week', 'audit.read', (_facts, _own, roll) => `/audit/export?${someWeek(roll)}&format=${pick(roll, ['csv', 'jsonl'])}`),
  ...FORMATS.map((format) => get('/constants/export', `the whole register, ${format}`, 'anyone', () => `/constants/export?format=${format}`)),
  get('/audit/export', 'all that a group has stated', 'audit.read', () => '/audit/export?act=constant.state&format=csv'),
]

/** Routes that no reader of this run asks, with the reason. */
export const LEFT_OUT: Record<string, string> = {
  'GET /audit/check': 'computes the whole chain of the trail anew: a check of a minute, no list',
  'GET /keys/:id.pem': 'a file of the installation, as /keys',
  'GET /password-resets/:token': 'a link for one person and one time, as the invitation',
}
