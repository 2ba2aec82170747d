import { defineNuxtConfig } from 'nuxt/config'

/** An empty app of the same framework: what the benches compare with. */
export default defineNuxtConfig({
  devtools: { enabled: false },
  srcDir: '.',
  compatibilityDate: '2026-01-01',
  nitro: { compressPublicAssets: true },
  telemetry: false,
})
