import { mountSuspended } from '@nuxt/test-utils/runtime'
import { expect, it } from 'vitest'
import { BriefingWho } from '#components'

const admission = { admission: 'a', until: '', talk: 'hose-whip', talkTitle: { en: 'Hose whip', es: 'El latigazo' }, check: null, markAsked: 'tap' as const, asksCheck: false }

it('signs a known phone in with one tap', async () => {
  useSessionStore().person = { id: 'p', name: 'Wren Abbott', role: 'worker', language: 'en' }
  const form = await mountSuspended(BriefingWho, { props: { admission, busy: false } })
  expect(form.text()).toContain('Wren Abbott')
  await form.find('form').trigger('submit')
  expect(form.emitted('sign')).toEqual([[{ kind: 'session' }, { kind: 'tap' }]])
})

it('asks an unknown phone for badge and PIN, and sends nothing of a visitor', async () => {
  useSessionStore().person = null
  const form = await mountSuspended(BriefingWho, { props: { admission, busy: false } })
  await form.find('input[name=badge]').setValue('2041')
  await form.find('input[name=pin]').setValue('739416')
  await form.find('form').trigger('submit')
  expect(form.emitted('sign')).toEqual([[{ kind: 'badge', badge: '2041', pin: '739416', stay: false }, { kind: 'tap' }]])
})

it('leaves out whom a visitor sees when nothing was typed', async () => {
  useSessionStore().person = null
  const form = await mountSuspended(BriefingWho, { props: { admission, busy: false } })
  await form.find('input[value=visitor]').setValue()
  await form.find('input[name=name]').setValue('Ada Cole')
  await form.find('input[name=company]').setValue('Redpump')
  await form.find('form').trigger('submit')
  expect(form.emitted('sign')).toEqual([[{ kind: 'visitor', visitor: { name: 'Ada Cole', company: 'Redpump' } }, { kind: 'tap' }]])
})

it('asks for a signature where the company does', async () => {
  useSessionStore().person = { id: 'p', name: 'Wren Abbott', role: 'worker', language: 'en' }
  const form = await mountSuspended(BriefingWho, { props: { admission: { ...admission, markAsked: 'signature' }, busy: false } })
  await form.find('form').trigger('submit')
  expect(form.emitted('sign')).toBeUndefined()
  expect(form.text()).toContain('Sign in the box')
})
