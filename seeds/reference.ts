import type { Knex } from 'knex'
import { randomUUID } from 'node:crypto'
import { modules } from '../shared/domain/curriculum'

interface TypeSeed {
  code: string
  name: { en: string, es: string }
  validity: { kind: 'never' | 'printed' } | { kind: 'period', months: number, anchor: 'day' | 'monthEnd' }
  basis: 'law' | 'issuer' | 'site' | 'company'
  perSite?: boolean
  source: string
}

const never = { kind: 'never' } as const
const months = (count: number) => ({ kind: 'period', months: count, anchor: 'day' } as const)

/** The outside and company credentials that every company starts with, each with where its rule comes from. */
export const referenceTypes: TypeSeed[] = [
  { code: 'hazard-communication', name: { en: 'Hazard communication', es: 'Comunicación de peligros' }, validity: never, basis: 'law', source: '29 CFR 1910.1200(h) (from memory): at first assignment and when a new hazard comes; no fixed interval' },
  { code: 'fall-protection', name: { en: 'Fall protection', es: 'Protección contra caídas' }, validity: never, basis: 'law', source: '29 CFR 1926.503: no fixed interval; retrain on change or lack of knowledge (c)' },
  { code: 'ladders', name: { en: 'Ladders', es: 'Escaleras' }, validity: never, basis: 'law', source: '29 CFR 1926.1060: no fixed interval' },
  { code: 'scaffold-user', name: { en: 'Scaffold user', es: 'Usuario de andamio' }, validity: never, basis: 'law', source: '29 CFR 1926.454(a): no fixed interval; retrain on change' },
  { code: 'scaffold-erector', name: { en: 'Scaffold erector', es: 'Armador de andamio' }, validity: never, basis: 'law', source: '29 CFR 1926.454(b): no fixed interval; retrain on change' },
  { code: 'excavation', name: { en: 'Excavation', es: 'Excavación' }, validity: never, basis: 'law', source: '29 CFR 1926.21(b)(2), 1926.651 (from memory): no fixed interval; retrain on trigger' },
  { code: 'lift-truck', name: { en: 'Lift truck evaluation', es: 'Evaluación de montacargas' }, validity: months(36), basis: 'law', source: '29 CFR 1910.178(l) through 1926.602(d): evaluation at least every 3 years' },
  { code: 'aerial-lift', name: { en: 'Aerial lift', es: 'Plataforma elevadora' }, validity: never, basis: 'law', source: '29 CFR 1926.453(b)(2) (from memory): trained and authorised; no fixed interval' },
  { code: 'signal-person', name: { en: 'Crane signal person', es: 'Señalero de grúa' }, validity: never, basis: 'law', source: '29 CFR 1926.1428 (from memory): only where a crane works; pump signals are a company sign-off' },
  { code: 'first-aid-cpr', name: { en: 'First aid and CPR', es: 'Primeros auxilios y RCP' }, validity: { kind: 'printed' }, basis: 'issuer', source: '29 CFR 1926.50(c): a valid certificate; the date is the issuer\'s, commonly 24 months' },
  { code: 'respirator-medical', name: { en: 'Respirator medical clearance', es: 'Autorización médica para respirador' }, validity: never, basis: 'law', source: '29 CFR 1910.134(e) (from memory): the fact only, never the form' },
  { code: 'respirator-fit', name: { en: 'Respirator fit test', es: 'Prueba de ajuste de respirador' }, validity: months(12), basis: 'law', source: '29 CFR 1910.134(f)(2): every 12 months, one per facepiece' },
  { code: 'respirator-training', name: { en: 'Respirator training', es: 'Capacitación de respirador' }, validity: months(12), basis: 'law', source: '29 CFR 1910.134(k)(5): every 12 months' },
  { code: 'silica', name: { en: 'Silica', es: 'Sílice' }, validity: never, basis: 'law', source: '29 CFR 1926.1153(i)(2): no fixed interval' },
  { code: 'site-orientation', name: { en: 'Site orientation', es: 'Orientación de la obra' }, validity: never, basis: 'site', perSite: true, source: 'Company rule: once at each site' },
  { code: 'heat-illness', name: { en: 'Heat illness prevention', es: 'Prevención de golpe de calor' }, validity: { kind: 'period', months: 12, anchor: 'monthEnd' }, basis: 'company', source: 'Company rule: yearly' },
  { code: 'outreach-card', name: { en: 'Outreach card (10 or 30 hours)', es: 'Tarjeta de 10 o 30 horas' }, validity: never, basis: 'issuer', source: 'Issuer: kept as a card; meets no rule by itself' },
]

const pourModules = new Set(['concrete-for-walls', 'before-the-pour', 'pump-and-hose', 'pour-rate', 'blowout-response', 'pour-lead'])

interface DutySeed {
  code: string
  name: { en: string, es: string }
  learningBeside?: boolean
  sameDayFix?: boolean
  recencyMonths?: number
  asks: string[][]
}

/** The duties on the wall, with what each asks for until the safety manager changes it. */
export const referenceDuties: DutySeed[] = [
  { code: 'stacker', name: { en: 'Stacker', es: 'Colocador de bloques' }, asks: [['stacking'], ['running-bond']] },
  { code: 'brace-hand', name: { en: 'Brace hand', es: 'Puntalero' }, asks: [['bracing-and-plumb'], ['fall-protection'], ['scaffold-user']] },
  { code: 'rebar-hand', name: { en: 'Rebar hand', es: 'Varillero' }, asks: [['steel']] },
  { code: 'hose-hand', name: { en: 'Hose hand', es: 'Manguerero' }, learningBeside: false, sameDayFix: false, recencyMonths: 6, asks: [['pump-and-hose'], ['blowout-response'], ['fall-protection']] },
  { code: 'vibrator-hand', name: { en: 'Vibrator hand', es: 'Vibradorista' }, sameDayFix: false, recencyMonths: 6, asks: [['concrete-for-walls'], ['pour-rate'], ['fall-protection']] },
  { code: 'wall-watcher', name: { en: 'Wall watcher', es: 'Vigía del muro' }, recencyMonths: 6, asks: [['before-the-pour'], ['blowout-response']] },
  { code: 'pump-spotter', name: { en: 'Pump spotter', es: 'Guía de la bomba' }, sameDayFix: false, recencyMonths: 6, asks: [['pump-and-hose'], ['blowout-response']] },
  { code: 'telehandler-operator', name: { en: 'Telehandler operator', es: 'Operador de telehandler' }, sameDayFix: false, asks: [['lift-truck']] },
  { code: 'pour-lead', name: { en: 'Pour lead', es: 'Encargado del colado' }, sameDayFix: false, recencyMonths: 6, asks: [['pour-lead'], ['blowout-response'], ['first-aid-cpr']] },
]

const moduleTypes = (): TypeSeed[] => modules.map(module => ({
  code: module.slug,
  name: module.title,
  validity: months(pourModules.has(module.slug) ? 12 : 24),
  basis: 'company',
  source: 'Company rule: the module passed and signed off hands-on; no law sets this interval',
}))

async function insertMissingTypes(knex: Knex, now: string): Promise<void> {
  const known = new Set<string>(await knex('credentialTypes').pluck('code'))
  const moduleSlugs = new Set(modules.map(module => module.slug))
  for (const type of [...referenceTypes, ...moduleTypes()].filter(type => !known.has(type.code))) {
    const { validity } = type
    await knex('credentialTypes').insert({
      id: randomUUID(), code: type.code, nameEn: type.name.en, nameEs: type.name.es,
      validityKind: validity.kind, months: validity.kind === 'period' ? validity.months : null, anchor: validity.kind === 'period' ? validity.anchor : null,
      basis: type.basis, leadDays: 60, perSite: type.perSite ?? false, source: type.source, module: moduleSlugs.has(type.code) ? type.code : null, createdAt: now,
    })
  }
}

async function insertFirstDuties(knex: Knex, now: string): Promise<void> {
  if (await knex('duties').first('id')) return
  const types = new Map<string, string>((await knex('credentialTypes').select('id', 'code')).map(row => [row.code, row.id]))
  for (const [position, duty] of referenceDuties.entries()) {
    const dutyId = randomUUID()
    const ruleId = randomUUID()
    await knex('duties').insert({
      id: dutyId, code: duty.code, nameEn: duty.name.en, nameEs: duty.name.es, learningBeside: duty.learningBeside ?? true,
      sameDayFix: duty.sameDayFix ?? true, recencyMonths: duty.recencyMonths ?? null, position, createdAt: now,
    })
    await knex('rules').insert({ id: ruleId, dutyId, createdAt: now })
    await knex('ruleTypes').insert(duty.asks.flatMap((group, groupNumber) => group.map(code => ({ ruleId, groupNumber, typeId: types.get(code) }))))
  }
}

/** Adds the seeded types that are missing, and at the first run the duties with their rules. Safe to run again. */
export async function seedReference(knex: Knex, now = new Date().toISOString()): Promise<void> {
  await knex.transaction(async (trx) => {
    await insertMissingTypes(trx, now)
    await insertFirstDuties(trx, now)
  })
}

/** The Knex command line's entry: `npm run knex -- seed:run`. */
export async function seed(knex: Knex): Promise<void> {
  await seedReference(knex)
}
