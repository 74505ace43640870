import { readFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { openTypeOfWoff } from './woff'

export type Face = 'sans' | 'bold' | 'mono'

const SANS = '@fontsource/instrument-sans/files/instrument-sans'
const MONO = '@fontsource/jetbrains-mono/files/jetbrains-mono'

/** Files by the name they get in the document; nuxt.config.ts has the built server carry them. */
export const FONT_FILES = {
  'sans': `${SANS}-latin-400-normal.woff`,
  'sans-ext': `${SANS}-latin-ext-400-normal.woff`,
  'bold': `${SANS}-latin-600-normal.woff`,
  'bold-ext': `${SANS}-latin-ext-600-normal.woff`,
  'mono': `${MONO}-latin-400-normal.woff`,
  'mono-ext': `${MONO}-latin-ext-400-normal.woff`,
  'mono-greek': `${MONO}-greek-400-normal.woff`,
  'mono-cyrillic': `${MONO}-cyrillic-400-normal.woff`,
} as const
export type FontName = keyof typeof FONT_FILES

/** Where a sign is looked for, one after another: names from anywhere in Europe find their letters. */
export const FALLBACKS: Record<Face, readonly FontName[]> = {
  sans: ['sans', 'sans-ext', 'mono', 'mono-ext', 'mono-greek', 'mono-cyrillic'],
  bold: ['bold', 'bold-ext', 'mono', 'mono-ext', 'mono-greek', 'mono-cyrillic'],
  mono: ['mono', 'mono-ext', 'mono-greek', 'mono-cyrillic'],
}

let loading: Promise<Record<FontName, Buffer>> | null = null

/** The fonts as OpenType, read once. */
export function loadFonts(): Promise<Record<FontName, Buffer>> {
  loading ??= readFonts().catch((error: unknown) => {
    loading = null
    throw error
  })
  return loading
}

async function readFonts(): Promise<Record<FontName, Buffer>> {
  const { resolve } = createRequire(import.meta.url)
  const entries = await Promise.all(Object.entries(FONT_FILES).map(async ([name, file]) => [name, openTypeOfWoff(await readFile(resolve(file)))] as const))
  return Object.fromEntries(entries) as Record<FontName, Buffer>
}
