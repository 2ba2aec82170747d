import type { Language, Role } from '../domain/states'

/**
 * Who may do what, decided in one place. A role's row is its abilities; whose records an ability reaches
 * (own crews, own sites) is the server's `Reach`. Screens hide with the same functions that routes refuse with.
 */

/** Somebody signed in. `role` is what they may act as now: a badge sign-in has a worker's abilities, whoever it is. */
export interface Actor {
  personId: string
  name: string
  role: Role
  /** The role that the company gave, whatever the way in. */
  givenRole: Role
  language: Language
  via: 'password' | 'badge'
}

const everybody = ['worker', 'foreman', 'superintendent', 'safety', 'admin'] as const
const leads = ['foreman', 'superintendent'] as const

/** Each ability with the roles that have it (the table of people and access). */
const holders = {
  'own.records': everybody,
  'nearMiss.report': everybody,
  'nearMiss.answer': ['safety'],
  'people.read': ['foreman', 'superintendent', 'safety', 'admin'],
  'people.write': ['admin'],
  'people.invite': ['foreman', 'superintendent', 'admin'],
  'pin.reset': ['foreman', 'superintendent', 'admin'],
  'sites.read': everybody,
  'sites.write': ['admin'],
  'requirements.read': everybody,
  'requirements.write': ['safety'],
  'holds.read': ['safety'],
  'credentials.read': everybody,
  'credentials.readAll': ['safety'],
  'credentials.add': everybody,
  'credentials.verify': ['safety'],
  'credentials.export': ['safety'],
  /** Lists of people, sites, crews, briefings and clearance as files. */
  'lists.export': ['safety', 'admin'],
  'reminders.send': ['safety'],
  'renewals.manage': ['safety'],
  'modules.invite': [...leads, 'safety'],
  /** Who is named as a competent person at the site; the service asks for the naming. */
  'allowances.give': everybody,
  'clearance.read': ['foreman', 'superintendent', 'safety', 'admin'],
  'learning.own': everybody,
  'signOff.give': [...leads, 'safety'],
  'companyTexts.write': ['safety'],
  'trainingMinutes.read': ['safety', 'admin'],
  'itemReview.read': ['safety'],
  'itemReview.strike': ['safety'],
  'briefing.run': [...leads, 'safety'],
  'briefing.read': everybody,
  'imports.run': ['admin'],
  'mail.read': ['admin'],
  'audit.read': ['safety', 'admin'],
  'settings.write': ['admin'],
  'packets.make': [...leads, 'safety', 'admin'],
} as const satisfies Record<string, readonly Role[]>

export type Ability = keyof typeof holders

/** True when the actor's role has the ability at all; whose records it reaches is asked separately. */
export function can(actor: Pick<Actor, 'role'> | null | undefined, ability: Ability): boolean {
  return !!actor && (holders[ability] as readonly Role[]).includes(actor.role)
}

/** Roles whose granting asks for the password again and is told to all who hold them. */
export const isGuardedRole = (role: Role) => role === 'safety' || role === 'admin'

/** Managers see every crew, site and person of the company; others what they lead. */
export const reachesAll = (actor: Pick<Actor, 'role'>) => actor.role === 'safety' || actor.role === 'admin'
