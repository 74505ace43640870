import type { Config } from 'tailwindcss'

export default {
  content: ['./app/**/*.{vue,ts}'],
} satisfies Config
