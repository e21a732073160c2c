import { Router } from 'express'
import { constantNumberText } from '../../shared/constant-number.ts'
import { env } from '../env.ts'
import { notFound } from '../errors.ts'
import { html, type Html } from '../html.ts'
import { lastPublicNumber, publicConstants } from '../queries/sitemap.ts'

/** Constants in one file of the sitemap, by their numbers. */
const NUMBERS = 10_000

/** For search engines: where to look and where not, and which constants are public. */
export const robots = Router()

// The API stays open to them, since the pages read from it; what has no end, filters and files made on demand, does not.
robots.get('/robots.txt', (_req, res) => {
  res.type('text/plain').send(
    ['User-agent: *', 'Disallow: /register?', 'Disallow: /look-up?', 'Disallow: /digit-check?', 'Disallow: /api/v1/constants/export', '', `Sitemap: ${env.publicUrl}/sitemap.xml`, ''].join('\n'),
  )
})

robots.get('/sitemap.xml', async (_req, res) => {
  const files = Math.ceil((await lastPublicNumber()) / NUMBERS)
  const entries = Array.from({ length: files }, (_, index) => html`<sitemap><loc>${env.publicUrl}/sitemap-${index + 1}.xml</loc></sitemap>`)
  res.type('application/xml').send(xml(html`<sitemapindex xmlns="http://www.sitemaps.org/schemas/sitemap/0.9">${entries}</sitemapindex>`))
})

robots.get(/^\/sitemap-([1-9]\d{0,4})\.xml$/, async (req, res) => {
  const last = Number(req.params[0]) * NUMBERS
  const constants = await publicConstants(last - NUMBERS, last)
  if (constants.length === 0) throw notFound('part of the sitemap')
  const entries = constants.map(({ number, changed_at: at }) => html`<url><loc>${env.publicUrl}/constants/${constantNumberText(number)}</loc><lastmod>${at.toISOString()}</lastmod></url>`)
  res.type('application/xml').send(xml(html`<urlset xmlns="http://www.sitemaps.org/schemas/sitemap/0.9">${entries}</urlset>`))
})

const xml = ({ text }: Html): string => `<?xml version="1.0" encoding="UTF-8"?>\n${text}\n`
