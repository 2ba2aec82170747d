import type { Config } from 'tailwindcss'
import plugin from 'tailwindcss/plugin'

/** Named by material, used by meaning (see DEVELOPERS.md); the values for light and dark stand in assets/css/main.css. */
const material = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

export default {
  darkMode: 'media',
  content: ['./components/**/*.{vue,ts}', './layouts/**/*.vue', './pages/**/*.vue', './app.vue', './error.vue', './composables/**/*.ts'],
  theme: {
    extend: {
      colors: {
        'foam': material('foam'),
        'block': material('block'),
        'slab': material('slab'),
        'edge': material('edge'),
        'slate': material('slate'),
        'mortar': material('mortar'),
        'chalk': material('chalk'),
        'chalk-wash': material('chalk-wash'),
        'rust': material('rust'),
        'moss': material('moss'),
        'straw': material('straw'),
        'brick': material('brick'),
        'on-chalk': material('on-chalk'),
      },
      fontFamily: {
        sans: ['Atkinson Hyperlegible', 'system-ui', 'sans-serif'],
        mono: ['Atkinson Hyperlegible Mono', 'ui-monospace', 'SFMono-Regular', 'Menlo', 'DejaVu Sans Mono', 'monospace'],
      },
      minHeight: { field: '3.5rem', row: '2.75rem' },
      borderRadius: { DEFAULT: '3px' },
    },
  },
  // `office:` styles what stands in the office shell (html.office), at a desk's width.
  plugins: [plugin(({ addVariant }) => addVariant('office', '@media (min-width: 1024px) { html.office & }'))],
  corePlugins: { container: false },
} satisfies Config
