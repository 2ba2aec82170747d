/** Loads who is signed in once per visit; a person's stored language wins over the browser's. */
export default defineNuxtPlugin({
  name: 'session',
  dependsOn: ['i18n:plugin'],
  async setup() {
    const session = useSessionStore()
    const place = usePlaceStore()
    if (!session.isLoaded) {
      await session.load()
      if (session.person) await place.load()
    }
    const { $i18n: i18n } = useNuxtApp()
    watch(() => session.person?.language, async (language) => {
      if (language && language !== i18n.locale.value) await i18n.setLocale(language)
    })
    if (session.person && session.person.language !== i18n.locale.value) await i18n.setLocale(session.person.language)
  },
})
