import { routeOfFile } from '../../modules/route-list'
import { filesBelow, readProjectFile } from './project-files'

export interface ApiRoute { method: string, path: string, file: string, source: string, ability: string }

/** Every API route of the project with the ability that its file names; `public` for those without a session. */
export const apiRoutes = (): ApiRoute[] => filesBelow('server/api', '.ts').map((file) => {
  const source = readProjectFile(`server/api/${file}`)
  const ability = /definePublicRoute\(/.test(source) ? 'public' : /ability: '([\w.]+)'/.exec(source)?.[1] ?? ''
  return { ...routeOfFile(file), file, source, ability }
})
