import withNuxt from './.nuxt/eslint.config.mjs'

/** One way of looking: pages → components → composables → shared; server/api → services → data → shared. */
const noImports = (files, patterns, ignores = []) => ({
  files,
  ignores,
  rules: { 'no-restricted-imports': ['error', { patterns: patterns.map(([group, message]) => ({ group, message, allowTypeImports: true })) }] },
})

export default withNuxt(
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      'vue/multi-word-component-names': 'off',
      'vue/max-attributes-per-line': 'off',
      'vue/singleline-html-element-content-newline': 'off',
      'vue/no-multiple-template-root': 'off',
      'vue/no-v-html': 'error',
      'no-console': 'off',
    },
  },
  noImports(['shared/**'], [
    [['vue', 'h3', 'knex', 'nuxt', '#imports', '#app', 'pinia'], 'shared/ is pure: take what you need as a parameter.'],
    [['**/server/**', '~/**', '~~/**'], 'Nothing in shared/ looks up; move the rule here or pass its answer in.'],
  ]),
  noImports(['server/api/**'], [
    [['knex', '**/data/**'], 'A route calls one service; queries live in server/data, reached through server/services.'],
  ]),
  noImports(['server/services/**'], [
    [['h3', '**/api/**'], 'Services know no HTTP: throw a Refusal instead.'],
  ]),
  noImports(['server/data/**'], [
    [['h3', '**/api/**'], 'Data functions know no HTTP.'],
    [['**/services/**', '!**/services/hashing', '!**/services/hashing.ts'], 'server/data looks only at shared/ and at the hash functions.'],
  ]),
  noImports(['pages/**', 'components/**', 'composables/**', 'stores/**', 'layouts/**', 'middleware/**', 'plugins/**'], [
    [['**/server/**'], 'Screens talk to the server over its API.'],
  ]),
  {
    files: ['pages/**', 'components/**', 'composables/**', 'stores/**', 'layouts/**', 'plugins/**'],
    rules: {
      'no-restricted-syntax': ['error', {
        selector: 'CallExpression[callee.name=/^queryCollection/]',
        message: 'queryCollection brings a database to the client (422 KB): ask our own /api routes instead.',
      }],
    },
  },
  {
    files: ['server/**', 'shared/**'],
    ignores: ['server/services/clock.ts', 'server/services/sessions.ts'],
    rules: {
      'no-restricted-syntax': ['error',
        { selector: 'CallExpression[callee.object.name="Date"][callee.property.name="now"]', message: 'Take the time from the work\'s `now`: there is one clock (server/services/clock.ts).' },
        { selector: 'NewExpression[callee.name="Date"][arguments.length=0]', message: 'Take the time from the work\'s `now`: there is one clock (server/services/clock.ts).' },
      ],
    },
  },
)
