import type { SessionView } from '#shared/schemas/session'
import { can as roleCan, type Ability } from '#shared/access/abilities'

/** Who is signed in, for every screen; the server decides again at each request. */
export const useSessionStore = defineStore('session', () => {
  const person = ref<SessionView['person'] | null>(null)
  const isLoaded = ref(false)

  /** Asks the server who is signed in; nobody is a normal answer. */
  async function load() {
    const ask = useRequestFetch()
    person.value = await ask<SessionView>('/api/session').then(answer => answer.person, () => null)
    isLoaded.value = true
  }

  /** True when the signed-in role has the ability; courtesy only. */
  const can = (ability: Ability) => roleCan(person.value, ability)
  const isLead = computed(() => person.value?.role === 'foreman' || person.value?.role === 'superintendent')
  const isOffice = computed(() => person.value?.role === 'safety' || person.value?.role === 'admin')

  async function signOut() {
    await $fetch('/api/session', { method: 'DELETE' })
    person.value = null
    await forgetKept()
    usePlaceStore().$reset()
    await navigateTo('/sign-in')
  }

  return { person, isLoaded, load, can, isLead, isOffice, signOut }
})
