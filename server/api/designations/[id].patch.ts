import { idParams } from '#shared/schemas/common'
import { previewQuery } from '#shared/schemas/crews-and-sites'
import { designationChanges, designationView, previewView } from '#shared/schemas/requirements'
import { changeDesignation } from '../../services/designations'

export default defineRoute({
  summary: 'Change or end a naming, or preview what that would do',
  ability: 'requirements.write',
  params: idParams,
  query: previewQuery,
  body: designationChanges,
  answer: designationView.or(previewView),
}, ({ work, params, body, query }) => changeDesignation(work, params.id, body, query))
