import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { addDays } from '#shared/domain/dates'
import {
  canBeAllowedForAShift, type Clearance, clearanceOf, type ClearanceQuestion, credentialsByType,
} from '#shared/domain/clearance'
import { prepareRules, type Rule } from '#shared/domain/rules'
import { verifications } from '#shared/domain/states'
import type { Credential, CredentialType } from '#shared/domain/validity'
import { aCredential, aType } from './builders/credentials'

const types = new Map<string, CredentialType>([
  aType({ code: 'hazard-communication' }),
  aType({ code: 'ladders' }),
  aType({ code: 'scaffold-user' }),
  aType({ code: 'site-orientation', basis: 'site', perSite: true }),
  aType({ code: 'first-aid-cpr', validity: { kind: 'printed' }, basis: 'issuer' }),
  aType({ code: 'lift-truck', validity: { kind: 'period', months: 36 }, basis: 'law' }),
  aType({ code: 'stacking', module: 'stacking' }),
  aType({ code: 'pump-and-hose', module: 'pump-and-hose' }),
].map(type => [type.code, type]))

const rules: Rule[] = [
  { id: '1', appliesTo: { everybody: true }, groups: [['hazard-communication']] },
  { id: '2', appliesTo: { duty: 'stacker' }, groups: [['stacking'], ['ladders', 'scaffold-user']] },
  { id: '3', appliesTo: { site: 'north' }, groups: [['site-orientation']] },
  { id: '4', appliesTo: { duty: 'telehandler-operator' }, groups: [['lift-truck']] },
  { id: '5', appliesTo: { duty: 'hose-hand' }, groups: [['pump-and-hose']] },
]

const card = (type: string, changes: Partial<Credential> = {}) => aCredential({ id: type, type, ...changes })
const everything = [
  card('hazard-communication'), card('stacking'), card('ladders', { expiresOn: '2027-05-31' }),
  card('site-orientation', { siteId: 'north' }),
]

function ask(changes: Partial<ClearanceQuestion> = {}): Clearance {
  return clearanceOf({
    person: { id: 'p', hiredOn: '2026-01-05' },
    duty: { code: 'stacker', learningBeside: true },
    siteId: 'north', date: '2026-12-01', rules: prepareRules(rules), types, credentials: everything,
    moduleMinutes: new Map([['stacking', { minutes: 30, handsOnMinutes: 45 }]]),
    ...changes,
  })
}

const without = (type: string, ...others: Credential[]) => [...everything.filter(credential => credential.type !== type), ...others]
const reasons = (clearance: Clearance) => clearance.missing.map(missing => missing.why.kind)

describe('clearance', () => {
  it('holds when every group is met, until the first of them runs out', () => {
    expect(ask()).toEqual({ state: 'cleared', until: '2027-05-31', missing: [], allowedFor: [] })
  })

  it('still holds on its last day and not on the day after', () => {
    expect(ask({ date: '2027-05-31' }).state).toBe('cleared')
    const dayAfter = ask({ date: '2027-06-01' })
    expect(dayAfter.state).toBe('notCleared')
    expect(dayAfter.missing[0]).toEqual({
      anyOf: ['ladders', 'scaffold-user'], why: { kind: 'expired', type: 'ladders', on: '2027-05-31' }, fix: { kind: 'card', type: 'ladders' },
    })
  })

  it('lasts as long as the longest-lasting type inside each group', () => {
    expect(ask({ credentials: [...everything, card('scaffold-user', { expiresOn: '2027-08-31' })] }).until).toBe('2027-08-31')
    expect(ask({ credentials: [...everything, card('scaffold-user')] }).until).toBeNull()
  })

  it('asks nothing where there are no rules', () => {
    expect(ask({ rules: prepareRules([]), credentials: [] })).toMatchObject({ state: 'cleared', until: null, missing: [] })
  })

  it('takes a list or an index and says the same', () => {
    expect(ask({ credentials: credentialsByType(everything) })).toEqual(ask())
  })

  it('counts an orientation only at the site it names', () => {
    const elsewhere = ask({ credentials: without('site-orientation', card('site-orientation', { siteId: 'south' })) })
    expect(elsewhere.missing).toEqual([{
      anyOf: ['site-orientation'], why: { kind: 'neverHeld', type: 'site-orientation' }, fix: { kind: 'orientation', type: 'site-orientation', siteId: 'north' },
    }])
    expect(ask({ siteId: 'south', credentials: without('site-orientation') }).state).toBe('cleared')
  })

  it('does not count a type that nobody defined', () => {
    const odd = ask({ rules: prepareRules([{ id: '1', appliesTo: { everybody: true }, groups: [['unheard-of']] }]), credentials: [card('unheard-of')] })
    expect(reasons(odd)).toEqual(['neverHeld'])
  })

  it('ends on the eve of a withdrawal, a leaving or a hold that is already dated', () => {
    expect(ask({ credentials: without('stacking', card('stacking', { withdrawnOn: '2026-12-10' })) }).until).toBe('2026-12-09')
    expect(ask({ person: { id: 'p', hiredOn: '2026-01-05', leftOn: '2026-12-20' } }).until).toBe('2026-12-19')
    expect(ask({ holds: [{ from: '2026-12-05', to: '2026-12-06' }] }).until).toBe('2026-12-04')
  })
})

describe('what is missing', () => {
  const why = (changes: Partial<Credential>) => ask({ credentials: without('ladders', card('ladders', changes)) }).missing[0]

  it('says not verified, and names the card to look at', () => {
    expect(why({ verification: 'unverified' })).toMatchObject({ why: { kind: 'notVerified' }, fix: { kind: 'verify', credentialId: 'ladders' } })
  })

  it('says from when a card is valid that is not yet', () => {
    expect(why({ issuedOn: '2026-12-02' })).toMatchObject({ why: { kind: 'notYetValid', on: '2026-12-02' }, fix: { kind: 'wait', on: '2026-12-02' } })
  })

  it('says since when a card is withdrawn, and that a rejected one needs another', () => {
    expect(why({ withdrawnOn: '2026-12-01' })).toMatchObject({ why: { kind: 'withdrawn', on: '2026-12-01' }, fix: { kind: 'card' } })
    expect(why({ verification: 'rejected' })).toMatchObject({ why: { kind: 'rejected' }, fix: { kind: 'card', type: 'ladders' } })
  })

  it('tells the reason nearest to good when several types could meet the group', () => {
    const both = ask({ credentials: without('ladders', card('ladders', { expiresOn: '2026-06-30' }), card('scaffold-user', { verification: 'unverified' })) })
    expect(both.missing[0]?.why).toEqual({ kind: 'notVerified', type: 'scaffold-user' })
    expect(both.missing[0]?.fix).toEqual({ kind: 'verify', type: 'scaffold-user', credentialId: 'scaffold-user' })
  })

  it('tells the latest of several expiries', () => {
    const twice = without('ladders', card('ladders', { id: 'a', expiresOn: '2026-06-30' }), card('ladders', { id: 'b', expiresOn: '2026-11-30' }))
    expect(ask({ credentials: twice }).missing[0]?.why.on).toBe('2026-11-30')
  })

  it('offers the module with its minutes, or only the hands-on when the quiz is passed', () => {
    const untaught = { credentials: without('stacking') }
    expect(ask(untaught).missing[0]?.fix).toEqual({ kind: 'module', module: 'stacking', minutes: 75 })
    expect(ask({ ...untaught, moduleMinutes: undefined }).missing[0]?.fix).toEqual({ kind: 'module', module: 'stacking', minutes: null })
    expect(ask({ ...untaught, learning: new Map([['stacking', { passedOn: '2026-11-30' }]]) }).missing[0]?.fix)
      .toEqual({ kind: 'signOff', module: 'stacking', minutes: 45 })
  })
})

describe('a person', () => {
  it('is not cleared before the first day of work, nor from the day of leaving', () => {
    const on = (date: string) => ask({ date, person: { id: 'p', hiredOn: '2026-12-01', leftOn: '2026-12-20' } })
    expect(reasons(on('2026-11-30'))).toEqual(['notEmployed'])
    expect(on('2026-12-01').state).toBe('cleared')
    expect(on('2026-12-19').state).toBe('cleared')
    expect(on('2026-12-20')).toMatchObject({ state: 'notCleared', until: null })
  })

  it('on hold is cleared for nothing, first and last day included', () => {
    const on = (date: string) => ask({ date, holds: [{ from: '2026-12-01', to: '2026-12-03' }] })
    expect(on('2026-11-30').state).toBe('cleared')
    expect(on('2026-12-01').missing).toEqual([{ anyOf: [], why: { kind: 'onHold' }, fix: { kind: 'safetyManager' } }])
    expect(on('2026-12-03').state).toBe('notCleared')
    expect(on('2026-12-04').state).toBe('cleared')
    expect(ask({ date: '2027-05-01', holds: [{ from: '2026-12-01' }] }).state).toBe('notCleared')
  })

  it('too young for the telehandler is not cleared, and no date is told', () => {
    const young = { id: 'p', hiredOn: '2026-01-05', under18Until: '2027-03-04' }
    const driving = ask({ person: young, duty: { code: 'telehandler-operator', learningBeside: true }, credentials: [...everything, card('lift-truck')] })
    expect(driving.state).toBe('notCleared')
    expect(driving.missing).toEqual([{ anyOf: [], why: { kind: 'underAge' }, fix: { kind: 'none' } }])
    expect(ask({ person: young }).state).toBe('cleared')
  })
})

describe('learning beside', () => {
  const passed = new Map([['stacking', { passedOn: '2026-12-01' }]])
  const practice = new Map([['stacking', { practiceFrom: '2026-12-01', practiceTo: '2026-12-03' }]])

  it('is open to whoever passed the quiz and misses only the hands-on', () => {
    expect(ask({ credentials: without('stacking'), learning: passed })).toMatchObject({ state: 'learning', until: '2027-05-31' })
    expect(ask({ credentials: without('stacking'), learning: passed, date: '2026-11-30' }).state).toBe('notCleared')
  })

  it('is open during booked practice, first and last day included', () => {
    const on = (date: string) => ask({ credentials: without('stacking'), learning: practice, date })
    expect(on('2026-11-30').state).toBe('notCleared')
    expect(on('2026-12-01')).toMatchObject({ state: 'learning', until: '2026-12-03' })
    expect(on('2026-12-03').state).toBe('learning')
    expect(on('2026-12-04').state).toBe('notCleared')
  })

  it('is closed where the duty forbids it', () => {
    expect(ask({ duty: { code: 'stacker', learningBeside: false }, credentials: without('stacking'), learning: passed }).state).toBe('notCleared')
  })

  it('is closed while an outside card is missing as well, or on hold', () => {
    expect(ask({ credentials: [card('hazard-communication')], learning: passed }).state).toBe('notCleared')
    expect(ask({ credentials: without('stacking'), learning: passed, holds: [{ from: '2026-12-01' }] }).state).toBe('notCleared')
  })

  it('does not come back by the quiz that an expired or withdrawn credential rested on', () => {
    const held = (changes: Partial<Credential>) => without('stacking', card('stacking', { issuedOn: '2026-02-10', ...changes }))
    const withQuiz = (passedOn: string) => new Map([['stacking', { passedOn }]])
    expect(ask({ credentials: held({ withdrawnOn: '2026-11-20' }), learning: withQuiz('2026-02-10') }).state).toBe('notCleared')
    expect(ask({ credentials: held({ withdrawnOn: '2026-11-20' }), learning: withQuiz('2026-11-20') }).state).toBe('learning')
    expect(ask({ credentials: held({ expiresOn: '2026-11-20' }), learning: withQuiz('2026-02-10') }).state).toBe('notCleared')
    expect(ask({ credentials: held({ expiresOn: '2026-11-20' }), learning: withQuiz('2026-11-21') }).state).toBe('learning')
  })
})

describe('recent practice of a duty', () => {
  const hose = { code: 'hose-hand', learningBeside: false, recencyMonths: 6 }
  const credentials = [...everything, card('pump-and-hose', { issuedOn: '2026-05-31' })]

  it('ends the clearance so many months after the last day of doing it', () => {
    expect(ask({ duty: hose, credentials, lastDoneOn: '2026-08-31' })).toMatchObject({ state: 'cleared', until: '2027-02-28' })
    expect(ask({ duty: hose, credentials, lastDoneOn: '2026-08-31', date: '2027-02-28' }).state).toBe('cleared')
    expect(ask({ duty: hose, credentials, lastDoneOn: '2026-08-31', date: '2027-03-01' }).missing[0]?.why)
      .toEqual({ kind: 'expired', type: 'pump-and-hose', on: '2027-02-28' })
  })

  it('counts from the sign-off when the duty was never done', () => {
    expect(reasons(ask({ duty: hose, credentials, date: '2026-11-30' }))).toEqual([])
    expect(reasons(ask({ duty: hose, credentials, date: '2026-12-01' }))).toEqual(['expired'])
  })

  it('does not touch what everybody or the site asks for', () => {
    const asRuleOfAll = prepareRules([{ id: '1', appliesTo: { everybody: true }, groups: [['pump-and-hose']] }])
    expect(ask({ duty: hose, credentials, rules: asRuleOfAll })).toMatchObject({ state: 'cleared', until: null })
  })
})

describe('a one-shift allowance', () => {
  const unverified = without('ladders', card('ladders', { verification: 'unverified', expiresOn: '2027-05-31' }))
  const allowance = { credentialId: 'ladders', siteId: 'north', date: '2026-12-01' }

  it('clears for that day at that site, and says by which card', () => {
    expect(ask({ credentials: unverified, allowances: [allowance] }))
      .toEqual({ state: 'cleared', until: '2026-12-01', missing: [], allowedFor: ['ladders'] })
  })

  it('is worth nothing on another day, at another site, or for another card', () => {
    for (const changes of [{ date: '2026-12-02' }, { siteId: 'south' }, { credentialId: 'other' }]) {
      expect(ask({ credentials: unverified, allowances: [{ ...allowance, ...changes }] }).state).toBe('notCleared')
    }
  })

  it('does not revive a card that is expired, withdrawn or rejected', () => {
    for (const changes of [{ expiresOn: '2026-11-30' }, { withdrawnOn: '2026-12-01' }, { verification: 'rejected' as const }]) {
      const ended = without('ladders', card('ladders', { verification: 'unverified', ...changes }))
      expect(ask({ credentials: ended, allowances: [allowance] }).state).toBe('notCleared')
    }
  })

  it('never stands in for an evaluation that the law asks for', () => {
    expect(canBeAllowedForAShift(aType({ validity: { kind: 'period', months: 36 }, basis: 'law' }))).toBe(false)
    expect(canBeAllowedForAShift(aType({ basis: 'law' }))).toBe(true)
    const truck = ask({
      duty: { code: 'telehandler-operator', learningBeside: false },
      credentials: [...everything, card('lift-truck', { verification: 'unverified' })],
      allowances: [{ ...allowance, credentialId: 'lift-truck' }],
    })
    expect(reasons(truck)).toEqual(['notVerified'])
  })
})

describe('for any person', () => {
  const day = fc.integer({ min: 0, max: 900 }).map(days => addDays('2025-06-01', days))
  const credential = fc.record({
    id: fc.uuid(), type: fc.constantFrom(...types.keys()), issuedOn: day, expiresOn: fc.option(day),
    verification: fc.constantFrom(...verifications, 'verified' as const, 'verified' as const),
    withdrawnOn: fc.option(day, { freq: 1 }), siteId: fc.constantFrom('north', 'south', null),
  })
  const duty = fc.constantFrom('stacker', 'telehandler-operator', 'hose-hand')
    .map(code => ({ code, learningBeside: code === 'stacker', recencyMonths: code === 'hose-hand' ? 6 : null }))
  const person = fc.record({ id: fc.constant('p'), hiredOn: day, leftOn: fc.option(day, { freq: 1 }) })
  const question = fc.record({
    person, duty, date: day, siteId: fc.constantFrom('north', 'south'), credentials: fc.array(credential, { maxLength: 12 }),
    lastDoneOn: fc.option(day), holds: fc.array(fc.record({ from: day, to: fc.option(day) }), { maxLength: 1 }),
  })

  it('a further valid credential never takes a clearance away, nor shortens it', () => {
    fc.assert(fc.property(question, credential, (asked, further) => {
      const before = ask(asked)
      const after = ask({ ...asked, credentials: [...asked.credentials, { ...further, verification: 'verified', withdrawnOn: null }] })
      if (before.state === 'cleared') {
        expect(after.state).toBe('cleared')
        expect(before.until === null ? after.until === null : after.until === null || after.until >= before.until).toBe(true)
      }
    }), { numRuns: 400 })
  })

  it('a withdrawal never adds a clearance', () => {
    fc.assert(fc.property(question, fc.nat(), day, (asked, pick, withdrawnOn) => {
      const index = asked.credentials.length === 0 ? -1 : pick % asked.credentials.length
      const credentials = asked.credentials.map((one, at) =>
        at === index ? { ...one, withdrawnOn: one.withdrawnOn && one.withdrawnOn < withdrawnOn ? one.withdrawnOn : withdrawnOn } : one)
      if (ask(asked).state !== 'cleared') expect(ask({ ...asked, credentials }).state).not.toBe('cleared')
    }), { numRuns: 400 })
  })

  it('a clearance holds on every day through its last, and not on the day after', () => {
    const complete = [card('hazard-communication'), card('stacking'), card('ladders'), card('lift-truck'), card('pump-and-hose'),
      card('site-orientation', { siteId: 'north' })]
    fc.assert(fc.property(question, fc.array(fc.option(day), { minLength: 6, maxLength: 6 }), fc.nat({ max: 200 }), (asked, expiries, step) => {
      const credentials = complete.map((one, index) => ({ ...one, issuedOn: '2025-01-01', expiresOn: expiries[index] ?? null }))
      const answer = ask({ ...asked, credentials, siteId: 'north' })
      if (answer.state !== 'cleared') return
      const stateOn = (date: string) => ask({ ...asked, credentials, siteId: 'north', date }).state
      const later = addDays(asked.date, step)
      if (answer.until === null || later <= answer.until) expect(stateOn(later)).toBe('cleared')
      if (answer.until !== null) expect(stateOn(addDays(answer.until, 1))).toBe('notCleared')
    }), { numRuns: 400 })
  })

  it('the clearance on a day is what the history as known that day says: what came later changes nothing', () => {
    fc.assert(fc.property(question, (asked) => {
      const isKnown = (date?: string | null) => typeof date === 'string' && date <= asked.date
      const asKnown = {
        ...asked, lastDoneOn: isKnown(asked.lastDoneOn) ? asked.lastDoneOn : null,
        credentials: asked.credentials.filter(one => isKnown(one.issuedOn)).map(one => ({ ...one, withdrawnOn: isKnown(one.withdrawnOn) ? one.withdrawnOn : null })),
        person: { ...asked.person, leftOn: isKnown(asked.person.leftOn) ? asked.person.leftOn : null },
        holds: asked.holds.filter(hold => isKnown(hold.from)),
      }
      // The caller gives the last day of doing the duty on or before the date asked about.
      const full = ask({ ...asked, lastDoneOn: asKnown.lastDoneOn })
      const then = ask(asKnown)
      expect(full.state).toBe(then.state)
      if (full.state === 'cleared') expect(then.until === null || (full.until !== null && full.until <= then.until)).toBe(true)
    }), { numRuns: 600 })
  })

  it('nothing is missing exactly when cleared', () => {
    fc.assert(fc.property(question, (asked) => {
      const answer = ask(asked)
      expect(answer.missing.length === 0).toBe(answer.state === 'cleared')
    }), { numRuns: 400 })
  })
})
