import { mountSuspended } from '@nuxt/test-utils/runtime'
import { expect, it } from 'vitest'
import { TodayStop } from '#components'
import type { TodayPerson } from '#shared/schemas/today'

const names = { site: { id: 's', code: 's', name: 'S', timeZone: 'UTC' }, date: '2026-12-01', dutyNames: { 'hose-hand': { en: 'Hose hand', es: 'Manguerero' }, 'stacker': { en: 'Stacker', es: 'Colocador de bloques' } }, typeNames: { 'pump-and-hose': { en: 'Pump and hose', es: 'Bomba y manguera' } } }
const stop = (duty: string, why: TodayPerson['stops'][number]['missing'][number]['why'], fix: { kind: string, [field: string]: unknown }) => ({ duty, state: 'notCleared' as const, until: null, missing: [{ anyOf: why.type ? [why.type] : [], why, fix }] })
const person = (stops: TodayPerson['stops']): TodayPerson => ({ personId: 'p', name: 'D. Ferro', crew: null, state: 'notCleared', duties: stops, stops })

it('says who is stopped from which duty, why, since when, and the fix in minutes', async () => {
  const row = await mountSuspended(TodayStop, { props: { names, person: person([stop('hose-hand', { kind: 'expired', type: 'pump-and-hose', on: '2026-11-28' }, { kind: 'module', module: 'pump-and-hose', minutes: 25 })]) } })
  expect(row.text()).toContain('D. Ferro, Hose hand')
  expect(row.text()).toContain('Pump and hose expired Nov 28')
  expect(row.text()).toContain('25 min of training')
  expect(row.classes()).toContain('border-brick')
})

it('says a hold once, whatever it stops, and nothing of its reason', async () => {
  const hold = (duty: string) => stop(duty, { kind: 'onHold' }, { kind: 'safetyManager' })
  const row = await mountSuspended(TodayStop, { props: { names, person: person([hold('hose-hand'), hold('stacker')]) } })
  expect(row.text().match(/On hold/g)).toHaveLength(1)
  expect(row.text()).not.toContain('Fix')
})
