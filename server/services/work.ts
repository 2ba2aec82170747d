import type { Actor } from '#shared/access/abilities'
import type { Db } from '../data/database'
import type { Company } from '../data/company'
import type { Reach } from '../data/reach'
import type { Settings } from './settings'

/**
 * What a service needs to know about the request it works for. Passed first, so that one process could serve
 * one database per company later, and so that tests need no server.
 */
export interface Work<Who extends Actor | null = Actor> {
  db: Db
  actor: Who
  /** This moment, ISO instant; read once per request so that one piece of work has one time. */
  now: string
  /** The calendar date of `now` in the company's time zone. */
  today: string
  company: Company
  settings: Settings
  /** Which crews, sites and people the actor leads; loaded on first use. */
  reach: () => Promise<Reach>
}
