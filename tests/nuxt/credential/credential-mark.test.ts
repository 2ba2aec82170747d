import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import { CredentialMark } from '#components'
import { credentialStates } from '#shared/domain/states'

describe('CredentialMark', () => {
  it('draws each state as a shape of its own, so that it survives greyscale print', async () => {
    const shapes = await Promise.all(credentialStates.map(async state => (await mountSuspended(CredentialMark, { props: { state } })).find('svg').html()))
    expect(new Set(shapes).size).toBe(credentialStates.length)
  })

  it('always says the word beside the mark', async () => {
    const mark = await mountSuspended(CredentialMark, { props: { state: 'dueSoon' } })
    expect(mark.text()).toBe('due soon')
  })

  it('is hidden from screen readers, which read the word', async () => {
    const mark = await mountSuspended(CredentialMark, { props: { state: 'expired' } })
    expect(mark.find('svg').attributes('aria-hidden')).toBe('true')
  })
})
