import type { Config } from 'tailwindcss'

/** Colours are the tokens of app/assets/css/tokens.css and nothing else. */
export default {
  content: ['./app/**/*.{vue,ts}'],
  theme: {
    colors: {
      'transparent': 'transparent',
      'current': 'currentColor',
      'frost': 'var(--frost)',
      'sheet': 'var(--sheet)',
      'rule': 'var(--rule)',
      'rule-strong': 'var(--rule-strong)',
      'ink': 'var(--ink)',
      'ink-soft': 'var(--ink-soft)',
      'copper': 'var(--copper)',
      'copper-wash': 'var(--copper-wash)',
      'on-copper': 'var(--on-copper)',
    },
    fontFamily: {
      sans: ['"Instrument Sans Variable"', 'system-ui', 'sans-serif'],
      mono: ['"JetBrains Mono"', 'ui-monospace', 'monospace'],
    },
    extend: {
      transitionDuration: { DEFAULT: '160ms' },
    },
  },
} satisfies Config
