import { idParams } from '#shared/schemas/common'
import { siteView } from '#shared/schemas/crews-and-sites'
import { readSite } from '../../services/sites'

export default defineRoute({
  summary: 'One site',
  ability: 'sites.read',
  params: idParams,
  answer: siteView,
}, ({ work, params }) => readSite(work, params.id))
