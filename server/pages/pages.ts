import { Router, type ErrorRequestHandler, type Request, type RequestHandler, type Response } from 'express'
import { claimSlug, parseClaimNumber, parseConstantNumber } from '../../shared/constant-number.ts'
import { pageHead, UNKNOWN_PAGE } from '../../shared/page-head.ts'
import { PAGES, type PageName } from '../../shared/pages.ts'
import { claimReference } from '../../shared/schemas/claim.ts'
import { constantQuery } from '../../shared/schemas/constant.ts'
import { notFound } from '../errors.ts'
import { log } from '../log.ts'
import { mayRead, readerOf } from '../middleware/authenticate.ts'
import { toProblem } from '../middleware/error-handler.ts'
import { rateLimit } from '../middleware/rate-limit.ts'
import type { SignedInMember } from '../middleware/request.ts'
import { validate } from '../middleware/validate.ts'
import { findConstant } from '../queries/constant.ts'
import { constantDetail } from '../queries/constant-page.ts'
import { claimDetailIfOpen } from '../queries/claim-page.ts'
import { claimPage } from './claim.ts'
import { constantPage } from './constant.ts'
import { estimatePage, estimatesPage } from './estimate.ts'
import { registerPage } from './register.ts'
import { PageTemplate, type PageContent } from './template.ts'

/** A page whose head and text come from the database. */
interface Shown {
  /** As readers without account get it; undefined where it is not open to them. Nothing else of it is ever written into a page. */
  toAll(req: Request): Promise<PageContent | undefined> | PageContent
  /** Whether it is open to this member, who then gets the page without its words and reads them through the API. */
  isOpenTo?(member: SignedInMember, req: Request): Promise<boolean>
  /** Reads what stands behind the question mark, as the API does. */
  input?: RequestHandler
}

const numberIn = ({ params }: Request): number => parseConstantNumber(String(params.number)) ?? 0
const claimIn = ({ params }: Request): string | undefined => claimReference.safeParse(params.id).data

const REGISTER: Shown = { input: validate({ query: constantQuery }), toAll: ({ input }) => registerPage(input) }

const SHOWN: Partial<Record<PageName, Shown>> = {
  home: REGISTER,
  register: REGISTER,
  constant: {
    toAll: async (req) => {
      const constant = await constantDetail(undefined, numberIn(req))
      return constant && constantPage(constant)
    },
    isOpenTo: async (member, req) => (await findConstant(member, numberIn(req))) !== undefined,
  },
  claim: {
    toAll: async (req) => {
      const reference = claimIn(req)
      const claim = reference === undefined ? undefined : await claimDetailIfOpen(undefined, reference)
      return claim && claimPage(claim)
    },
    isOpenTo: async (member, req) => {
      const reference = claimIn(req)
      return reference !== undefined && (await claimDetailIfOpen(member, reference)) !== undefined
    },
  },
  estimates: { toAll: estimatesPage },
  estimate: { toAll: ({ params }) => estimatePage(String(params.id)) },
}

/**
 * Answers the address of every page with the client's page, its head and its text without JavaScript filled in. What does not exist
 * and what is not open to the reader get the same answer, 404, and the client says the rest.
 */
export function pages(index: string, ratePerMinute: number): Router {
  const router = Router()
  const template = new PageTemplate(index)
  const send = (res: Response, status: number, content: PageContent): boolean => {
    const page = template.fill(content)
    if (page !== undefined) res.status(status).type('html').send(page)
    return page !== undefined
  }
  const answer = (name: PageName): RequestHandler => async (req, res, next) => {
    if (!req.accepts('html')) return next()
    const shown = SHOWN[name]
    res.set('Cache-Control', 'no-cache')
    const content = shown ? await shown.toAll(req) : { head: pageHead(name) }
    if (!content) await requireOpen(shown, req, res)
    if (!send(res, 200, content ?? { head: pageHead(name) })) next()
  }
  const unknown: RequestHandler = (req, res, next) => {
    const isPage = (req.method === 'GET' || req.method === 'HEAD') && req.accepts('html')
    if (!isPage || !send(res.set('Cache-Control', 'no-cache'), 404, { head: UNKNOWN_PAGE })) next()
  }
  const failed: ErrorRequestHandler = (error, req, res, next) => {
    const problem = toProblem(error)
    if (problem.status >= 500) log.error({ err: error, requestId: req.id, path: req.path }, 'page failed')
    const head = problem.status === 404 ? UNKNOWN_PAGE : { ...UNKNOWN_PAGE, title: problem.title }
    if (problem.status === 429 || !send(res.set(problem.headers), problem.status, { head })) next(error)
  }
  const limit = rateLimit(ratePerMinute)
  for (const name of Object.keys(PAGES) as PageName[]) router.get(PAGES[name].path, limit, SHOWN[name]?.input ?? [], answer(name))
  router.get('/claims/:constant/:ordinal', citedClaim)
  router.use(unknown, failed)
  return router
}

/** A claim's number typed into the address as it is cited, MST-0042/1, leads to its page. */
const citedClaim: RequestHandler = ({ params: { constant, ordinal } }, res, next) => {
  const claim = parseClaimNumber(`${String(constant)}/${String(ordinal)}`)
  if (!claim) return next()
  res.redirect(301, `/claims/${claimSlug(claim.number, claim.ordinal)}`)
}

/** Refuses in the same words what does not exist and what is not open to whoever asks. */
async function requireOpen(shown: Shown | undefined, req: Request, res: Response): Promise<void> {
  res.vary('Cookie').set('Cache-Control', 'private, no-cache')
  const member = shown?.isOpenTo && (await readerOf(req))
  if (!member || !mayRead(member) || !(await shown.isOpenTo?.(member, req))) throw notFound()
}
