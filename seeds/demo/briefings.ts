import { addMinutes, addSeconds, endOfDay, type Instant } from '../../shared/domain/dates'
import { stepAt } from '../../shared/domain/presence'
import type { BriefingWithSite } from '../../server/data/briefings'
import type { NewSignIn, SignIn } from '../../server/data/sign-ins'
import { buildSheet } from '../../server/services/sheet-body'
import { appendSheet } from '../../server/services/sheets'
import { loadSigningKey, type SigningKey } from '../../server/services/signing-key'
import { randomBytes } from 'node:crypto'
import { type PlannedBriefing, planBriefings } from './briefing-plan'
import { type DemoContext, insertAll, instantAt } from './context'
import { employerOf, personId } from './people'
import { demoId } from './random'
import type { DemoPerson } from './roster'
import { demoSites, siteId } from './sites-and-crews'
import { pickTalk, versionsOf } from './talks'

const visitors = [
  { name: 'Gwen Halloran', company: 'Ashlar Engineering' },
  { name: 'Paul Istvan', company: 'Pinyon Ready Mix' },
  { name: 'Teresa Amaya', company: 'Town of Quill Creek, inspection' },
  { name: 'Bo Renquist', company: 'Cutbank General Builders' },
]

const nameOf = (one: DemoPerson) => `${one.given} ${one.family}`

type Line = SignIn & { createdAt: Instant }

function lineOf(briefing: { id: string, openedAt: Instant, closedAt: Instant }, plan: PlannedBriefing, one: DemoPerson): Line {
  const { random, foreman } = plan
  const isLate = random.chance(0.03)
  const isByHand = isLate || one.readsWell === false || !one.hasSignedIn || random.chance(0.08)
  const signedAt = isLate ? addMinutes(briefing.closedAt, random.between(2, 9)) : addSeconds(briefing.openedAt, random.between(150, 560))
  const reason = isLate ? 'late' : one.readsWell === false ? 'cannotRead' : random.pick(['noPhone', 'deadPhone', 'noSignal'] as const)
  const isOwnMark = !isByHand || one.readsWell === false
  return {
    id: demoId(`sign-in ${briefing.id} ${one.badge}`), briefingId: briefing.id, key: demoId(`key ${briefing.id} ${one.badge}`), personId: personId(one), visitor: null,
    name: nameOf(one), employer: employerOf(one), trade: one.trade ?? null,
    method: isByHand ? (isOwnMark ? 'foremanDevice' : 'addedByForeman') : 'ownPhone', reason: isByHand ? reason : null,
    mark: { kind: 'tap' }, language: one.language, signedAt, late: isLate,
    enteredBy: isByHand ? personId(foreman) : null, enteredByName: isByHand ? nameOf(foreman) : null, answer: null, explainedByName: null,
    withoutSignal: false, presenceStep: isByHand ? null : stepAt(signedAt), removedAt: null, createdAt: signedAt,
  }
}

function visitorLine(briefing: { id: string, openedAt: Instant }, plan: PlannedBriefing): Line {
  const { random, foreman } = plan
  const visitor = { ...random.pick(visitors), host: nameOf(foreman) }
  const signedAt = addSeconds(briefing.openedAt, random.between(200, 560))
  return {
    id: demoId(`visitor ${briefing.id}`), briefingId: briefing.id, key: demoId(`visitor key ${briefing.id}`), personId: null, visitor, name: visitor.name, employer: visitor.company, trade: null,
    method: 'ownPhone', reason: null, mark: { kind: 'typed', text: visitor.name }, language: 'en', signedAt, late: false, enteredBy: null, enteredByName: null,
    answer: null, explainedByName: null, withoutSignal: false, presenceStep: stepAt(signedAt), removedAt: null, createdAt: signedAt,
  }
}

function signInRow({ visitor, mark, answer: _none, name: _name, employer: _employer, trade: _trade, enteredByName: _by, explainedByName: _explained, removedAt: _removed, ...row }: Line) {
  const kept: Omit<NewSignIn, 'visitor' | 'mark' | 'answer' | 'explainedBy'> = row
  return { ...kept, mark: JSON.stringify(mark), visitorName: visitor?.name ?? null, visitorCompany: visitor?.company ?? null, visitorHost: visitor?.host ?? null }
}

interface Told { plan: PlannedBriefing, briefing: BriefingWithSite & { closedAt: Instant, sealedAt: Instant }, lines: Line[], sealedBy: DemoPerson | null }

function tell(plan: PlannedBriefing, lastTalk: string | undefined): Told {
  const { site, date, foreman, random, expected } = plan
  const id = demoId(`briefing ${site.key} ${date}`)
  const openedAt = instantAt(date, 6, random.between(38, 54), site.timeZone)
  const closedAt = addMinutes(openedAt, random.between(10, 13))
  const isForgotten = random.chance(0.02)
  const sealedAt = isForgotten ? addMinutes(endOfDay(date, site.timeZone), 4) : addMinutes(closedAt, random.between(12, 30))
  const talk = pickTalk(plan.work, Number(date.slice(5, 7)), lastTalk, random)
  const present = expected.filter(one => one.key === foreman.key || random.chance(0.94))
  const head = { id, openedAt, closedAt }
  const lines = present.map(one => lineOf(head, plan, one))
  if (random.chance(0.07)) lines.push(visitorLine(head, plan))
  return {
    plan,
    briefing: {
      id, siteId: siteId(site.key), localDate: date, runBy: personId(foreman), runByName: nameOf(foreman), runByRole: foreman.role, talk: talk.slug, talkVersions: versionsOf(talk), work: plan.work, weather: plan.weather,
      notes: null, secret: randomBytes(20), openedAt, closedAt, sealedAt, withoutSignal: false, createdAt: openedAt,
      site: { id: siteId(site.key), code: site.code, name: site.name, timeZone: site.timeZone, address: site.address },
    },
    lines, sealedBy: isForgotten ? null : foreman,
  }
}

function auditBriefing(context: DemoContext, { briefing, sealedBy }: Told, sheet: { hash: string, previousHash: string | null }): void {
  const subject = { kind: 'briefing', id: briefing.id }
  const { siteId: site, talk, openedAt, closedAt, sealedAt, runBy } = briefing
  context.audit.push(
    { at: openedAt, actorId: runBy, action: 'briefing.opened', subject, after: { siteId: site, talk, openedAt } },
    { at: closedAt, actorId: runBy, action: 'briefing.closed', subject, after: { closedAt } },
    { at: sealedAt, actorId: sealedBy && personId(sealedBy), action: 'briefing.sealed', subject, after: { hash: sheet.hash, previousHash: sheet.previousHash, automatically: sealedBy === null } },
  )
}

function briefingRow({ briefing }: Told) {
  const { runByName: _name, runByRole: _role, site: _site, talkVersions, work, weather, secret, ...row } = briefing
  return { ...row, secret: Buffer.from(secret), talkVersions: JSON.stringify(talkVersions), work: JSON.stringify(work), weather: weather && JSON.stringify(weather) }
}

async function sealOne(context: DemoContext, key: SigningKey, { briefing, lines, sealedBy, plan }: Told): Promise<{ hash: string, previousHash: string | null }> {
  const { id, siteId: site, closedAt, sealedAt } = briefing
  return appendSheet(context.knex, key, { siteId: site, briefingId: id, kind: 'sheet', sealedBy: sealedBy && personId(sealedBy), sealedAt }, number => buildSheet({
    allowances: [],
    briefing, closedAt, company: 'Cedar Hollow Walls', speakerEmployer: employerOf(plan.foreman), number, signIns: lines,
    expected: plan.expected.map(one => ({ id: personId(one), name: nameOf(one) })),
    seal: { sealedAt, sealedBy: sealedBy && nameOf(sealedBy), isClockSet: false },
  }))
}

function tellAll(context: DemoContext, site: (typeof demoSites)[number]): Told[] {
  const all: Told[] = []
  for (const plan of planBriefings(context, site)) {
    const told = tell(plan, all.at(-1)?.briefing.talk)
    if (told.briefing.sealedAt <= context.now) all.push(told)
  }
  return all
}

/** Two years of mornings: talks given, who signed, and each site's sheets in one chain. The last one was on the working day before today. */
export async function seedBriefings(context: DemoContext): Promise<void> {
  const key = loadSigningKey(context.settings)
  for (const site of demoSites) {
    const all = tellAll(context, site)
    await insertAll(context.knex, 'briefings', all.map(briefingRow))
    await insertAll(context.knex, 'signIns', all.flatMap(told => told.lines.map(signInRow)))
    for (const told of all) auditBriefing(context, told, await sealOne(context, key, told))
  }
}
