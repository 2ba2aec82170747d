import type { Language, Role } from '../../shared/domain/states'

/** A crew of the demo company. */
export type CrewKey = 'walls-a' | 'walls-b' | 'steel' | 'pour' | 'prairie-walls' | 'prairie-pour'

/**
 * What somebody can do: stacker (s), brace hand (b), rebar hand (r), hose hand (h), vibrator hand (v), wall
 * watcher (w), pump spotter (p), telehandler operator (t), pour lead (l), first aid (f), cuts with a respirator
 * (k), erects scaffolds (e), excavation (x), aerial lift (a), outreach card (o).
 */
export type Skill = 's' | 'b' | 'r' | 'h' | 'v' | 'w' | 'p' | 't' | 'l' | 'f' | 'k' | 'e' | 'x' | 'a' | 'o'

/** One invented person. Days are counted back from today; a negative one lies ahead. */
export interface DemoPerson {
  key: string
  given: string
  family: string
  badge: string
  crew?: CrewKey
  role: Role
  language: Language
  skills: string
  hiredDaysAgo: number
  leftDaysAgo?: number
  employer: 'own' | 'temp' | 'sub'
  trade?: string
  /** The part before the @; field hands have none. */
  mailbox?: string
  readsWell?: boolean
  /** Has a PIN or password and used it; the others still wait for their join link. */
  hasSignedIn: boolean
}

type Extra = Partial<Omit<DemoPerson, 'key' | 'given' | 'family' | 'badge' | 'skills' | 'hiredDaysAgo'>>

function person(name: `${string}|${string}`, badge: string, hiredDaysAgo: number, skills: string, extra: Extra = {}): DemoPerson {
  const [given = '', family = ''] = name.split('|')
  const key = family.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase().split(/[ -]/)[0] ?? ''
  return { key, given, family, badge, skills, hiredDaysAgo, role: 'worker', language: 'en', employer: 'own', hasSignedIn: true, ...extra }
}

const spanish = { language: 'es' } as const
const temp = { employer: 'temp' } as const

const office: DemoPerson[] = [
  person('Denise|Abernathy', '1002', 3390, 'f', { role: 'admin', mailbox: 'office' }),
  person('Marit|Solheim', '1003', 2230, 'bfekxo', { role: 'safety', mailbox: 'safety' }),
  person('Walter|Begaye', '1005', 2950, 'sbfexo', { role: 'superintendent', mailbox: 'super' }),
  person('Colleen|Vasquez-Moore', '1007', 1840, 'sbfexo', { role: 'superintendent', mailbox: 'colleen.vasquez-moore' }),
  person('Luther|Askew', '1009', 2610, 'tao', { trade: 'Yard and equipment' }),
]

const wallsA: DemoPerson[] = [
  person('Hector|Zamora', '1011', 2480, 'sbfkexo', { role: 'foreman', mailbox: 'foreman' }),
  person('Andre|Whitlock', '1037', 1130, 'so', { mailbox: 'installer' }),
  person('José Luis|Montoya Rivas', '1043', 1610, 'sbko', spanish),
  person('Efraín|Castañeda', '1051', 905, 'sbrk', spanish),
  person('Kyle|Brandvold', '1066', 612, 'so'),
  person('Samuel|Adeyemi', '1072', 498, 'brf'),
  person('María Elena|Quispe', '2008', 211, 's', { ...spanish, ...temp, readsWell: false }),
  person('Dustin|Hale', '2033', 26, '', { ...temp, hasSignedIn: false }),
  person('Yesenia|Cruz', '2041', 1, '', spanish),
].map(one => ({ ...one, crew: 'walls-a' as const }))

const wallsB: DemoPerson[] = [
  person('Dale|Kowalczyk', '1014', 2140, 'sbtfeo', { role: 'foreman', mailbox: 'dale.kowalczyk' }),
  person('Rogelio|Núñez', '1039', 1490, 'sbko', spanish),
  person('Priya|Raman', '1058', 820, 'sbo'),
  person('Tommy|Yellowhorse', '1061', 733, 'srf'),
  person('Iván|Solís Duarte', '1069', 540, 'sb', spanish),
  person('Brent|Ostrander', '1034', 1205, 'tao'),
  person('Wilmer|Aguilar', '2014', 164, 's', { ...spanish, ...temp }),
  person('Caleb|Nkemelu', '2029', 61, '', { ...temp }),
].map(one => ({ ...one, crew: 'walls-b' as const }))

const steel: DemoPerson[] = [
  person('Lupe|Arriaga', '1016', 2015, 'rbfexo', { role: 'foreman', language: 'es', mailbox: 'lupe.arriaga' }),
  person('Gerardo|Peña', '1041', 1380, 'rbk', spanish),
  person('Nate|Vandermolen', '1048', 1105, 'rto'),
  person('Silvia|Ordóñez', '1055', 880, 'rb', spanish),
  person('Dmitri|Volkov', '1063', 690, 'rbeo'),
  person('Abel|Trujillo Mena', '1078', 402, 'r', spanish),
  person('Rashid|Karimi', '1081', 337, 'rb'),
].map(one => ({ ...one, crew: 'steel' as const }))

const pour: DemoPerson[] = [
  person('Terrence|Boyd', '1018', 1790, 'lwfxo', { role: 'foreman', mailbox: 'terrence.boyd' }),
  person('Jesús|Herrera Lugo', '1035', 1555, 'hp', spanish),
  person('Lamar|Pettigrew', '1045', 1240, 'hpo'),
  person('Octavio|Rentería', '1053', 890, 'vw', spanish),
  person('Heather|Skaggs', '1060', 760, 'wf'),
  person('Benito|Maldonado', '1068', 560, 'vk', spanish),
  person('Curtis|Yoon', '1074', 470, 'wto'),
  person('Fidel|Barrios', '2022', 110, 'r', { ...spanish, ...temp }),
].map(one => ({ ...one, crew: 'pour' as const }))

const prairieWalls: DemoPerson[] = [
  person('Anh|Tran', '1021', 1420, 'sbtfexo', { role: 'foreman', mailbox: 'anh.tran' }),
  person('Oleksandr|Bondar', '1057', 860, 'sbo'),
  person('Noemí|Salgado', '1062', 710, 'sb', spanish),
  person('Garrett|Huebner', '1065', 625, 'stao'),
  person('Thanh|Le', '1071', 515, 'sk'),
  person('Ramiro|Escobedo', '1077', 420, 'sb', spanish),
  person('Josie|Lefevre', '1080', 345, 'rf'),
  person('Mamadou|Diallo', '2017', 140, 'r', temp),
].map(one => ({ ...one, crew: 'prairie-walls' as const }))

const prairiePour: DemoPerson[] = [
  person('Marcus|Lindqvist', '1024', 1350, 'lwfxo', { role: 'foreman', mailbox: 'marcus.lindqvist' }),
  person('Clint|Bauer', '1050', 920, 'hpto'),
  person('Eusebio|Ríos', '1056', 870, 'hp', spanish),
  person('Darnell|Coates', '1064', 640, 'vwo'),
  person('Pedro|Ixcoy', '1070', 530, 'w', { ...spanish, readsWell: false }),
  person('Becky|Schroeder', '1073', 480, 'wvf'),
  person('Isidro|Camacho', '1079', 390, 'wp', spanish),
  person('Tou|Vang', '1083', 280, 'rs'),
].map(one => ({ ...one, crew: 'prairie-pour' as const }))

const others: DemoPerson[] = [
  person('Stan|Mroz', '3001', 410, '', { employer: 'sub', trade: 'Pump operator' }),
  person('Jolene|Figg', '3002', 250, '', { employer: 'sub', trade: 'Pump operator' }),
  person('Rick|Dunleavy', '1028', 1980, 'sbo', { leftDaysAgo: 296 }),
  person('Adán|Fuentes', '1059', 790, 'rb', { ...spanish, leftDaysAgo: 128 }),
  person('Shawna|Pike', '1067', 575, 's', { leftDaysAgo: 51 }),
  person('Mateo|Villalobos', '2011', 190, '', { ...spanish, ...temp, leftDaysAgo: 17 }),
  person('Kiona|Redfern', '2044', -6, '', { crew: 'walls-b', hasSignedIn: false }),
]

/** Everybody the demo company has or had on its roster. All of them are invented. */
export const roster: readonly DemoPerson[] = [
  ...office, ...wallsA, ...wallsB, ...steel, ...pour, ...prairieWalls, ...prairiePour, ...others,
]

/** The person with a key: the first family name in small letters without accents. Throws for an unknown one. */
export function personByKey(key: string): DemoPerson {
  const found = roster.find(one => one.key === key)
  if (!found) throw new RangeError(`Nobody in the demo company is called ${key}`)
  return found
}

/** True when the person has the skill. */
export const hasSkill = (one: DemoPerson, skill: Skill): boolean => one.skills.includes(skill)
