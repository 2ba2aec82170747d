import { describe, expect, it } from 'vitest'
import { can, type Ability } from '../../../shared/access/abilities'
import { roles } from '../../../shared/domain/states'
import { isPublicRoute, publicRoutes } from '../../../server/services/public-routes'
import { apiRoutes } from '../../support/api-routes'

const routes = apiRoutes()
const isKnownAbility = (ability: string) => roles.some(role => can({ role }, ability as Ability))

describe('API routes', () => {
  it('are found', () => expect(routes.length).toBeGreaterThan(80))

  it.each(routes.map(route => [`${route.method} ${route.path}`, route] as const))('%s names an ability or is on the public list', (_name, route) => {
    const concrete = route.path.replace(/\{\w+\}/g, 'x')
    if (route.ability === 'public') expect(isPublicRoute(route.method, concrete)).toBe(true)
    else {
      expect(isKnownAbility(route.ability)).toBe(true)
      expect(isPublicRoute(route.method, concrete)).toBe(false)
    }
  })

  it('hold no query of their own', () => {
    expect(routes.filter(route => /work\.db\(|from 'knex'/.test(route.source)).map(route => route.file)).toEqual([])
  })
})

describe('the public list', () => {
  it('names only routes that exist, each with its reason', () => {
    const existing = routes.filter(route => route.ability === 'public').map(route => `${route.method} ${route.path}`)
    for (const { method, path, why } of publicRoutes) {
      expect(existing).toContain(`${method} ${path.replace(/:(\w+)/g, '{$1}')}`)
      expect(why.length).toBeGreaterThan(10)
    }
  })

  it('does not open a neighbour: a longer or odd path still asks for a session', () => {
    expect(isPublicRoute('GET', '/api/session/sites')).toBe(false)
    expect(isPublicRoute('POST', '/api/briefings/1/sealing')).toBe(false)
    expect(isPublicRoute('GET', '/api/checks/cards/x/y')).toBe(false)
    expect(isPublicRoute('PATCH', '/api/session')).toBe(false)
  })
})
