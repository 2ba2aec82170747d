import { readdirSync } from 'node:fs'
import { join, relative } from 'node:path'
import { addTypeTemplate, defineNuxtModule } from 'nuxt/kit'

/** `server/api/credentials/[id]/withdrawal.post.ts` → `POST /api/credentials/{id}/withdrawal`. */
export function routeOfFile(file: string): { method: string, path: string } {
  const match = /^(.*?)(?:\.(get|post|put|patch|delete))?\.ts$/.exec(file)
  const path = (match?.[1] ?? file).replace(/(^|\/)index$/, '').replace(/\[(?:\.\.\.)?(\w+)\]/g, '{$1}')
  return { method: (match?.[2] ?? 'get').toUpperCase(), path: `/api/${path}`.replace(/\/$/, '') }
}

/** Makes `#route-list`: every API route with its loader, for the OpenAPI description. */
export default defineNuxtModule({
  meta: { name: 'route-list' },
  setup(_options, nuxt) {
    addTypeTemplate({
      filename: 'types/route-list.d.ts',
      getContents: () => 'declare module \'#route-list\' {\n  export const routeList: { method: string, path: string, load: () => Promise<unknown> }[]\n}\n',
    }, { nuxt: true, nitro: true })
    const folder = join(nuxt.options.rootDir, 'server/api')
    nuxt.hook('nitro:config', (config) => {
      config.virtual ??= {}
      config.virtual['#route-list'] = () => {
        const files = readdirSync(folder, { recursive: true, withFileTypes: true })
          .filter(entry => entry.isFile() && entry.name.endsWith('.ts'))
          .map(entry => relative(folder, join(entry.parentPath, entry.name)))
          .sort()
        const rows = files.map((file) => {
          const { method, path } = routeOfFile(file)
          return `  { method: ${JSON.stringify(method)}, path: ${JSON.stringify(path)}, load: () => import(${JSON.stringify(join(folder, file))}).then(m => m.default) },`
        })
        return `export const routeList = [\n${rows.join('\n')}\n]\n`
      }
    })
  },
})
