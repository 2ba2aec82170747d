import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { renderPoster } from '../documents/poster'
import { notFound } from './refusal'
import type { Work } from './work'

/** The site's poster; 404 for a site out of reach. Its link holds the public code only. */
export async function posterOf(work: Work, siteId: string, origin: string): Promise<{ bytes: Buffer, name: string }> {
  const site = await getSite(work.db, siteId)
  if (!site || !isWithin((await work.reach()).siteIds, site.id)) throw notFound('site')
  const bytes = await renderPoster({ code: site.code, name: site.name, address: site.address, company: work.company.name, url: `${origin}/s/${encodeURIComponent(site.code)}` })
  return { bytes, name: `poster-${site.code.replace(/[^\w-]/g, '-')}.pdf` }
}
