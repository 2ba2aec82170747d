import { idParams } from '#shared/schemas/common'
import { siteChanges, siteView } from '#shared/schemas/crews-and-sites'
import { changeSite } from '../../services/sites'

export default defineRoute({
  summary: 'Change a site',
  ability: 'sites.write',
  params: idParams,
  body: siteChanges,
  answer: siteView,
}, ({ work, params, body }) => changeSite(work, params.id, body))
