import { newSiteBody, siteView } from '#shared/schemas/crews-and-sites'
import { addSite } from '../../services/sites'

export default defineRoute({
  summary: 'Add a site',
  ability: 'sites.write',
  body: newSiteBody,
  answer: siteView,
  status: 201,
}, ({ work, body }) => addSite(work, body))
