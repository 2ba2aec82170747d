/** An empty app of the same framework: what the benches compare with. */
export default defineNuxtConfig({
  srcDir: '.',
  compatibilityDate: '2026-01-01',
  devtools: { enabled: false },
  telemetry: false,
  nitro: { compressPublicAssets: true },
})
