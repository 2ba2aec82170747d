import { createRequire } from 'node:module'
import { dirname, resolve } from 'node:path'

const languages = [
  { code: 'en', language: 'en-US', name: 'English' },
  { code: 'es', language: 'es-US', name: 'Español' },
] as const
/** One message file per part of the product, the same names in each language. */
const messageFiles = ['common', 'sign-in', 'people', 'learn', 'training', 'kept', 'talks', 'plan', 'board', 'packets', 'renewals', 'near-misses', 'item-review', 'briefing', 'credentials', 'records', 'errors']

/** The worker of exactly the pdf.js that vue-pdf-embed brings; another version refuses to talk to it. */
const pdfWorker = dirname(createRequire(resolve('node_modules/vue-pdf-embed/dist/index.mjs')).resolve('pdfjs-dist/legacy/build/pdf.worker.min.mjs'))

export default defineNuxtConfig({
  modules: ['@nuxt/eslint', '@pinia/nuxt', '@nuxtjs/tailwindcss', '@nuxtjs/i18n', '@nuxt/content', 'nuxt-security', '@vite-pwa/nuxt', './modules/route-list'],
  components: [
    { path: '~/components/content', global: true, pathPrefix: false },
    { path: '~/components' },
  ],
  devtools: { enabled: false },
  app: {
    head: {
      titleTemplate: '%s · Pourwright',
      meta: [
        { name: 'viewport', content: 'width=device-width, initial-scale=1, viewport-fit=cover' },
        { name: 'theme-color', content: '#F5F4EF', media: '(prefers-color-scheme: light)' },
        { name: 'theme-color', content: '#14181A', media: '(prefers-color-scheme: dark)' },
      ],
      link: [
        { rel: 'icon', type: 'image/svg+xml', href: '/icon.svg' },
        { rel: 'apple-touch-icon', href: '/apple-touch-icon.png' },
        { rel: 'manifest', href: '/manifest.webmanifest' },
      ],
    },
  },
  css: ['~/assets/css/main.css'],
  content: {
    database: { type: 'sqlite', filename: ':memory:' },
    experimental: { sqliteConnector: 'better-sqlite3' },
    build: { markdown: { highlight: false, toc: { depth: 2 } } },
    renderer: { anchorLinks: false },
  },
  /** Each can be set by an environment variable: `NUXT_DATABASE_PATH`, `NUXT_CLOCK`, and so on; the README has the table. */
  runtimeConfig: {
    databasePath: '.data/pourwright.sqlite',
    filesPath: '',
    signingKeyPath: '',
    signingKey: '',
    clock: '',
    demo: '',
    origin: '',
    tls: '',
    smtpUrl: '',
    textUrl: '',
    mailFrom: 'Pourwright <pourwright@localhost>',
    setupToken: '',
  },
  srcDir: '.',
  alias: { '#pdf-worker': pdfWorker },
  // No page rules are needed on the client: one request and some script less for each visit.
  experimental: { appManifest: false },
  compatibilityDate: '2026-01-01',
  nitro: {
    compressPublicAssets: true,
    esbuild: { options: { target: 'es2022' } },
    experimental: { tasks: true },
    scheduledTasks: { '* * * * *': ['mail:send'], '*/15 * * * *': ['reminders:queue', 'briefings:seal'] },
    serverAssets: [],
    // PDF fonts are read from their package, so the built server needs these files beside it.
    externals: { traceInclude: ['package.json', 'ttf/DejaVuSansCondensed.ttf', 'ttf/DejaVuSansCondensed-Bold.ttf', 'ttf/DejaVuSansMono.ttf'].map(file => resolve('node_modules/dejavu-fonts-ttf', file)) },
    typescript: { tsConfig: { include: [resolve('./migrations'), resolve('./seeds')] } },
  },
  typescript: { strict: true, typeCheck: false },
  telemetry: false,
  hooks: {
    // A lesson would otherwise fetch every drawing of the product ahead. Links still fetch their page when they come into view.
    'build:manifest': (manifest) => {
      for (const chunk of Object.values(manifest)) {
        chunk.dynamicImports = []
        chunk.prefetch = false
        // Letters beyond Latin 1 are fetched when a page has some.
        if (/latin-ext|mono/.test(chunk.file ?? '')) chunk.preload = false
      }
    },
    // Content writes every collection into a public dump; nothing of it may be prerendered or served (see server/middleware/0.content-gate.ts).
    'nitro:config': (config) => {
      for (const [path, rules] of Object.entries(config.routeRules ?? {})) {
        if (path.includes('__nuxt_content')) rules.prerender = false
      }
    },
  },
  eslint: { config: { stylistic: true } },
  i18n: {
    strategy: 'no_prefix',
    defaultLocale: 'en',
    locales: languages.map(({ code, ...rest }) => ({ code, ...rest, files: messageFiles.map(file => `${code}/${file}.json`) })),
    detectBrowserLanguage: { useCookie: true, cookieKey: 'language', fallbackLocale: 'en' },
  },
  pwa: {
    strategies: 'injectManifest',
    srcDir: 'service-worker',
    filename: 'sw.ts',
    registerType: 'prompt',
    injectManifest: { globPatterns: ['offline/index.html', 'icon*.{png,svg}'], globIgnores: ['**/pictures/**'] },
    manifest: {
      id: '/', name: 'Pourwright', short_name: 'Pourwright', start_url: '/', scope: '/', display: 'standalone',
      description: 'Training, certification tracking and safety briefings for insulating-concrete-form crews.',
      background_color: '#F5F4EF', theme_color: '#F5F4EF',
      icons: [
        { src: '/icon-192.png', sizes: '192x192', type: 'image/png' },
        { src: '/icon-512.png', sizes: '512x512', type: 'image/png' },
        { src: '/icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
      ],
    },
    // The worker is registered by plugins/service-worker.client.ts.
    client: { registerPlugin: false },
  },
  security: {
    rateLimiter: false,
    xssValidator: false,
    requestSizeLimiter: false,
    corsHandler: false,
    headers: {
      referrerPolicy: 'same-origin',
      crossOriginEmbedderPolicy: false,
      strictTransportSecurity: false,
      permissionsPolicy: { camera: ['self'] },
      contentSecurityPolicy: {
        'default-src': ['\'self\''],
        'script-src': ['\'self\'', '\'nonce-{{nonce}}\'', '\'strict-dynamic\''],
        'style-src': ['\'self\'', '\'unsafe-inline\''],
        'img-src': ['\'self\'', 'data:', 'blob:'],
        'font-src': ['\'self\''],
        'connect-src': ['\'self\''],
        'worker-src': ['\'self\''],
        'object-src': ['\'none\''],
        'base-uri': ['\'none\''],
        'form-action': ['\'self\''],
        'frame-ancestors': ['\'none\''],
        'upgrade-insecure-requests': false,
      },
    },
  },
  tailwindcss: { viewer: false, cssPath: false },
})
