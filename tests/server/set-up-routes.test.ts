import { beforeAll, describe, expect, it } from 'vitest'
import { createClient, signedIn, type Client } from '../support/client'

interface Named { id: string, name: string }
interface List<Item> { items: Item[], total: number }
interface Preview { stops: { personId: string, duty: string, was: string, becomes: string }[], frees: unknown[] }

let office: Client
let safety: Client
let foreman: Client
let installer: Client
let firstSite: Named & { code: string }
let next = 0
const unique = () => `t${process.pid}-${next++}`

const me = async (client: Client) => (await client.get<{ person: Named }>('/api/session')).body.person
const addPerson = async (more: Record<string, unknown> = {}) => (await office.post<Named & Record<string, unknown>>('/api/people', { name: 'Ivo Test', badge: unique(), hiredOn: '2026-01-05', ...more })).body
const addSite = async () => (await office.post<Named>('/api/sites', { code: unique(), name: 'Test site', timeZone: 'America/Denver' })).body

beforeAll(async () => {
  [office, safety, foreman, installer] = await Promise.all([signedIn('office'), signedIn('safety'), signedIn('foreman'), signedIn('installer')])
  firstSite = (await office.get<List<typeof firstSite>>('/api/sites')).body.items[0]!
})

describe('people', () => {
  it('are added with what is missing filled in, and read back', async () => {
    const badge = unique()
    const added = await office.post('/api/people', { name: 'Dario Ferro', badge })
    expect(added.status).toBe(201)
    expect(added.body).toMatchObject({ name: 'Dario Ferro', sortName: 'Ferro, Dario', badge, role: 'worker', language: 'en', employerKind: 'own', hiredOn: '2026-12-01', leftOn: null, hasSignedIn: false, version: 1 })
    expect((await office.get(`/api/people/${added.body.id}`)).body).toEqual(added.body)
  })

  it('never show the day of turning 18, to nobody', async () => {
    const person = await addPerson({ under18Until: '2027-08-09' })
    const changed = await office.patch(`/api/people/${person.id}`, { under18Until: '2027-08-10' })
    const list = await office.get(`/api/people?q=${person.badge}`)
    const audit = await office.get('/api/audit?perPage=200')
    for (const answer of [changed.text, list.text, audit.text, JSON.stringify(person)]) expect(answer).not.toMatch(/2027-08-(09|10)|under18/)
  })

  it('keep a badge and an e-mail to one person', async () => {
    const person = await addPerson({ email: `${unique()}@cedarhollow.example` })
    const badge = await office.post('/api/people', { name: 'Someone Else', badge: person.badge })
    expect([badge.status, badge.body]).toMatchObject([409, { data: { code: 'badgeTaken', fields: { badge: expect.any(String) } } }])
    const email = await office.post('/api/people', { name: 'Someone Else', badge: unique(), email: String(person.email).toUpperCase() })
    expect([email.status, email.body]).toMatchObject([409, { data: { code: 'emailTaken' } }])
  })

  it('refuse what is missing, unknown, too long or of the wrong type', async () => {
    const bad = [{}, { name: 'No badge' }, { name: '', badge: '1' }, { name: 'x'.repeat(121), badge: unique() }, { name: 'A B', badge: unique(), extra: 1 }, { name: 'A B', badge: unique(), role: 'boss' }, { name: 'A B', badge: unique(), hiredOn: '2026-02-30' }, { name: ['A'], badge: unique() }, []]
    for (const body of bad) expect([body, (await office.post('/api/people', body)).status]).toEqual([body, 400])
    expect((await office.post('/api/people', { name: 'A B', badge: unique(), crewId: 'no-such' })).status).toBe(422)
    expect((await office.post('/api/people', { name: 'A B', badge: unique(), hiredOn: '2026-05-01', leftOn: '2026-04-01' })).status).toBe(422)
    expect((await office.get('/api/people?perPage=201')).status).toBe(400)
    expect((await office.get('/api/people?sort=secret')).status).toBe(400)
  })

  it('are written by the office alone and read within reach', async () => {
    const stranger = await addPerson()
    for (const client of [safety, foreman, installer]) expect((await client.post('/api/people', { name: 'A B', badge: unique() })).status).toBe(403)
    expect((await installer.get('/api/people')).status).toBe(403)
    expect((await createClient().get('/api/people')).status).toBe(401)
    expect((await foreman.get(`/api/people/${stranger.id}`)).status).toBe(404)
    expect((await safety.get(`/api/people/${stranger.id}`)).status).toBe(200)
    const own = (await foreman.get<List<Named>>('/api/people?perPage=200')).body
    const all = (await safety.get<List<Named>>('/api/people?perPage=200')).body
    expect(own.total).toBeGreaterThan(2)
    expect(own.total).toBeLessThan(all.total)
    expect(own.items.map(person => person.id)).toContain((await me(installer)).id)
  })

  it('are found by part of a name or a badge, and by where they stand', async () => {
    const person = await addPerson({ name: `Zebulon ${unique()}`, leftOn: '2026-11-30' })
    expect((await office.get<List<Named>>('/api/people?q=zebulon&employed=false')).body.items.map(one => one.id)).toContain(person.id)
    expect((await office.get<List<Named>>('/api/people?q=zebulon&employed=true')).body.items.map(one => one.id)).not.toContain(person.id)
    const atSite = (await office.get<List<Named>>(`/api/people?site=${firstSite.id}&perPage=200`)).body.items.map(one => one.id)
    expect(atSite).toContain((await me(installer)).id)
    expect(atSite).not.toContain(person.id)
  })

  it('refuse a change over somebody else\'s', async () => {
    const person = await addPerson()
    expect((await office.patch(`/api/people/${person.id}`, { phone: '555-0100', version: 1 })).status).toBe(200)
    expect((await office.patch(`/api/people/${person.id}`, { phone: '555-0101', version: 1 })).body).toMatchObject({ statusCode: 409, data: { code: 'changed' } })
    expect((await office.patch(`/api/people/${person.id}`, { phone: null })).body).toMatchObject({ phone: null, version: 3 })
  })
})

describe('roles', () => {
  it('are not one\'s own to change', async () => {
    const answer = await office.patch(`/api/people/${(await me(office)).id}`, { role: 'safety', currentPassword: 'running-bond' })
    expect(answer.body).toMatchObject({ statusCode: 403, data: { code: 'ownRole' } })
  })

  it('that may change others\' records ask for the password again', async () => {
    const person = await addPerson()
    for (const more of [{}, { currentPassword: 'wrong-one' }]) {
      expect((await office.patch(`/api/people/${person.id}`, { role: 'admin', ...more })).body).toMatchObject({ statusCode: 403, data: { code: 'passwordNeeded' } })
      expect((await office.post('/api/people', { name: 'A B', badge: unique(), role: 'safety', ...more })).body).toMatchObject({ statusCode: 403, data: { code: 'passwordNeeded' } })
    }
    expect((await office.get(`/api/people/${person.id}`)).body).toMatchObject({ role: 'worker' })
    expect((await office.patch(`/api/people/${person.id}`, { role: 'safety', currentPassword: 'running-bond' })).body).toMatchObject({ role: 'safety' })
    const mail = (await office.get<List<{ recipient: string, subject: string }>>('/api/mail?perPage=200')).body.items.filter(one => one.subject === 'Ivo Test is now safety manager')
    expect(mail.map(one => one.recipient)).toEqual(expect.arrayContaining(['office@cedarhollow.example', 'safety@cedarhollow.example']))
  })

  it('end the sessions of whoever gets another one, or leaves', async () => {
    for (const change of [{ role: 'foreman' }, { leftOn: '2026-12-01' }]) {
      const person = await addPerson()
      const link = await office.post<{ url: string }>(`/api/people/${person.id}/join-link`)
      const phone = createClient()
      expect((await phone.post(`/api/join/${link.body.url.split('/').pop()}`, { pin: '583921', language: 'en' })).status).toBe(200)
      expect((await phone.get('/api/session')).status).toBe(200)
      expect((await office.patch(`/api/people/${person.id}`, change)).status).toBe(200)
      expect((await phone.get('/api/session')).status).toBe(401)
    }
  })
})

describe('crews, sites and assignments', () => {
  it('are kept by the office and read by those whom they concern', async () => {
    const crew = await office.post<Named>('/api/crews', { name: `Crew ${unique()}`, foremanId: (await me(foreman)).id, duties: [{ duty: 'stacker', count: 3 }] })
    expect([crew.status, crew.body]).toMatchObject([201, { foremanId: (await me(foreman)).id, duties: [{ duty: 'stacker', count: 3 }], people: 0 }])
    expect((await foreman.get(`/api/crews/${crew.body.id}`)).status).toBe(200)
    expect((await installer.get(`/api/crews/${crew.body.id}`)).status).toBe(404)
    expect((await office.patch(`/api/crews/${crew.body.id}`, { duties: [] })).body).toMatchObject({ name: crew.body.name, duties: [] })
    expect((await safety.patch(`/api/crews/${crew.body.id}`, { name: 'Mine' })).status).toBe(403)
    expect((await office.post('/api/crews', { name: crew.body.name })).status).toBe(409)
    expect((await office.post('/api/crews', { name: `Crew ${unique()}`, duties: [{ duty: 'no-such', count: 1 }] })).status).toBe(422)
    expect((await office.patch(`/api/crews/${crew.body.id}`, { foremanId: null })).status).toBe(200)
  })

  it('name a site by a code that is public and one of a kind', async () => {
    const code = unique()
    const site = await office.post<Named>('/api/sites', { code, name: 'Test site', timeZone: 'America/Chicago' })
    expect([site.status, site.body]).toMatchObject([201, { code, timeZone: 'America/Chicago', address: null, superintendentId: null }])
    expect((await office.post('/api/sites', { code: code.toUpperCase(), name: 'Other', timeZone: 'America/Chicago' })).body).toMatchObject({ statusCode: 409, data: { code: 'codeTaken' } })
    expect((await office.post('/api/sites', { code: unique(), name: 'Other', timeZone: 'Mars/Base' })).status).toBe(400)
    expect((await createClient().get(`/api/sites/by-code/${code}`)).body).toEqual({ code, name: 'Test site' })
    expect((await createClient().get('/api/sites/by-code/no-such')).status).toBe(404)
    expect((await foreman.get(`/api/sites/${site.body.id}`)).status).toBe(404)
    expect((await safety.get(`/api/sites/${site.body.id}`)).status).toBe(200)
  })

  it('keep one person to one site a day, the crew\'s roster counted', async () => {
    const [north, south, crew] = [await addSite(), await addSite(), (await office.post<Named>('/api/crews', { name: `Crew ${unique()}` })).body]
    const [inCrew, alone] = [await addPerson({ crewId: crew.id }), await addPerson()]
    const roster = (body: Record<string, unknown>) => office.post<Named>('/api/assignments', body)
    const first = await roster({ crewId: crew.id, siteId: north.id, from: '2026-12-01', to: '2026-12-05' })
    expect(first.status).toBe(201)
    for (const clash of [{ crewId: crew.id, from: '2026-12-05' }, { personId: inCrew.id, from: '2026-11-01', to: '2026-12-01' }]) {
      expect((await roster({ ...clash, siteId: south.id })).body).toMatchObject({ statusCode: 409, data: { code: 'rosteredElsewhere' } })
    }
    expect((await roster({ personId: inCrew.id, siteId: south.id, from: '2026-12-06' })).status).toBe(201)
    expect((await roster({ personId: alone.id, siteId: south.id, from: '2026-12-01' })).status).toBe(201)
    expect((await office.patch(`/api/assignments/${first.body.id}`, { to: '2026-12-06' })).status).toBe(409)
    expect((await office.patch(`/api/assignments/${first.body.id}`, { to: '2026-12-04' })).body).toMatchObject({ to: '2026-12-04', crewId: crew.id })
    expect((await roster({ siteId: south.id, from: '2026-12-01' })).status).toBe(400)
    expect((await roster({ personId: alone.id, crewId: crew.id, siteId: south.id, from: '2026-12-01' })).status).toBe(400)
    expect((await roster({ personId: alone.id, siteId: south.id, from: '2026-12-02', to: '2026-12-01' })).status).toBe(422)
    expect((await office.delete(`/api/assignments/${first.body.id}`)).status).toBe(204)
    expect((await office.get(`/api/assignments/${first.body.id}`)).status).toBe(404)
    expect((await installer.delete(`/api/assignments/${first.body.id}`)).status).toBe(403)
  })
})

describe('duties, types and rules', () => {
  it('read a duty by its code and keep that', async () => {
    const code = unique()
    expect((await safety.post('/api/duties', { code, name: { en: 'Tester', es: 'Probador' }, recencyMonths: 6 })).status).toBe(201)
    expect((await installer.get(`/api/duties/${code}`)).body).toMatchObject({ code, learningBeside: true, sameDayFix: true, recencyMonths: 6 })
    expect((await safety.patch(`/api/duties/${code}`, { recencyMonths: null, learningBeside: false })).body).toMatchObject({ recencyMonths: null, learningBeside: false })
    expect((await safety.patch(`/api/duties/${code}`, { code: 'other' })).status).toBe(400)
    expect((await safety.post('/api/duties', { code, name: { en: 'Tester', es: 'Probador' } })).status).toBe(409)
    for (const client of [office, foreman, installer]) expect((await client.post('/api/duties', { code: unique(), name: { en: 'A', es: 'B' } })).status).toBe(403)
  })

  it('say where a type comes from, and keep the law\'s interval to its day', async () => {
    const type = { code: unique(), name: { en: 'Test card', es: 'Tarjeta de prueba' }, validity: { kind: 'period', months: 12 }, basis: 'company', source: 'Company rule' }
    expect((await safety.post('/api/credential-types', type)).body).toMatchObject({ ...type, validity: { kind: 'period', months: 12, anchor: 'day' }, leadDays: 60, perSite: false, module: null })
    expect((await safety.post('/api/credential-types', { ...type, code: unique(), basis: 'law', validity: { kind: 'period', months: 12, anchor: 'monthEnd' } })).body).toMatchObject({ statusCode: 422, data: { code: 'monthEndOverrunsLaw' } })
    expect((await safety.post('/api/credential-types', { ...type, code: unique(), validity: { kind: 'period' } })).status).toBe(400)
    expect((await safety.post('/api/credential-types', { ...type, code: unique(), source: undefined })).status).toBe(400)
    expect((await installer.get('/api/credential-types/lift-truck')).body).toMatchObject({ basis: 'law', validity: { kind: 'period', months: 36 } })
  })

  it('preview whom a rule would stop, save nothing, then stop them', async () => {
    const body = { appliesTo: { duty: 'stacker', site: firstSite.id }, groups: [['respirator-fit', 'aerial-lift'], ['crane-none']] }
    expect((await safety.post('/api/rules', body)).status).toBe(422)
    const rule = { ...body, groups: [['respirator-medical']] }
    const before = (await safety.get<List<unknown>>('/api/rules?perPage=200')).body.total
    const preview = await safety.post<Preview>('/api/rules?preview=true', rule)
    expect(preview.status).toBe(200)
    expect(preview.body.stops).toContainEqual(expect.objectContaining({ personId: (await me(installer)).id, duty: 'stacker', siteId: firstSite.id, was: 'cleared', becomes: 'notCleared' }))
    expect((await safety.get<List<unknown>>('/api/rules?perPage=200')).body.total).toBe(before)
    const clearance = async () => (await foreman.get<{ people: { personId: string, duties: { state: string }[] }[] }>(`/api/clearance?site=${firstSite.id}&duty=stacker`)).body.people
    const { id: installerId } = await me(installer)
    const mine = async () => (await clearance()).find(one => one.personId === installerId)?.duties[0]?.state
    expect(await mine()).toBe('cleared')
    const saved = await safety.post<{ id: string }>('/api/rules', rule)
    expect([saved.status, saved.body]).toMatchObject([201, rule])
    expect(await mine()).toBe('notCleared')
    const eased = await safety.patch<Preview>(`/api/rules/${saved.body.id}?preview=true`, { groups: [['hazard-communication', 'respirator-medical']] })
    expect(eased.body.stops).toEqual([])
    expect(eased.body.frees.length).toBeGreaterThan(0)
    expect((await safety.delete(`/api/rules/${saved.body.id}`)).status).toBe(204)
    expect(await mine()).toBe('cleared')
  })

  it('refuse a rule that nobody could read', async () => {
    for (const body of [{ appliesTo: {}, groups: [['silica']] }, { appliesTo: { everybody: false }, groups: [['silica']] }, { appliesTo: { everybody: true }, groups: [] }, { appliesTo: { everybody: true }, groups: [[]] }, { appliesTo: { everybody: true, duty: 'stacker' }, groups: [['silica']] }]) {
      expect([body, (await safety.post('/api/rules', body)).status]).toEqual([body, 400])
    }
    expect((await safety.post('/api/rules', { appliesTo: { duty: 'no-such' }, groups: [['silica']] })).status).toBe(422)
    expect((await safety.post('/api/rules', { appliesTo: { site: 'no-such' }, groups: [['silica']] })).status).toBe(422)
  })
})

describe('designations and holds', () => {
  it('name a person in writing, shown to those whom it concerns', async () => {
    const person = await addPerson()
    const named = await safety.post<Named>('/api/designations', { personId: person.id, kind: 'competent', subject: 'scaffold', authority: 'May stop work on the scaffold', from: '2026-12-01' })
    expect([named.status, named.body]).toMatchObject([201, { personId: person.id, name: 'Ivo Test', siteId: null, to: null }])
    expect((await safety.patch(`/api/designations/${named.body.id}`, { to: '2026-12-31' })).body).toMatchObject({ to: '2026-12-31', subject: 'scaffold' })
    expect((await safety.patch(`/api/designations/${named.body.id}`, { to: '2026-11-30' })).status).toBe(422)
    expect((await foreman.get(`/api/designations/${named.body.id}`)).status).toBe(404)
    expect((await office.post('/api/designations', { personId: person.id, kind: 'competent', subject: 'fall', authority: 'x', from: '2026-12-01' })).status).toBe(403)
  })

  it('keep the reason of a hold to the safety manager', async () => {
    const { id } = await me(installer)
    const body = { personId: id, from: '2026-12-01', reason: 'A quiet word first' }
    const preview = await safety.post<Preview>('/api/holds?preview=true', body)
    expect(preview.body.stops.map(one => one.personId)).toEqual(expect.arrayContaining([id]))
    expect((await safety.get<List<unknown>>(`/api/holds?person=${id}`)).body.total).toBe(0)
    const hold = await safety.post<Named>('/api/holds', body)
    expect([hold.status, hold.body]).toMatchObject([201, { personId: id, reason: body.reason, to: null }])
    for (const client of [foreman, office, installer]) {
      const seen = await client.get(`/api/holds/${hold.body.id}`)
      expect(seen.body).toMatchObject({ personId: id, from: '2026-12-01' })
      expect(seen.text).not.toContain('quiet')
    }
    expect((await office.get('/api/audit?perPage=200')).text).not.toContain('quiet')
    expect((await foreman.get(`/api/clearance?site=${firstSite.id}&duty=stacker`)).text).toContain('onHold')
    await safety.patch(`/api/holds/${hold.body.id}`, { from: '2026-01-01', to: '2026-01-02' })
    expect((await foreman.post('/api/holds', body)).status).toBe(403)
  })
})

describe('the company', () => {
  it('is changed by the office', async () => {
    expect((await installer.get('/api/company')).body).toMatchObject({ name: 'Cedar Hollow Walls', timeZone: 'America/Denver', isDemo: true })
    expect((await safety.patch('/api/company', { markAsked: 'signature' })).status).toBe(403)
    expect((await office.patch('/api/company', { timeZone: 'Nowhere/Else' })).status).toBe(400)
    expect((await office.patch('/api/company', { language: 'en' })).body).toMatchObject({ language: 'en' })
  })
})
