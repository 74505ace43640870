import { existsSync } from 'node:fs'
import { installDebianPackages } from './apt.mjs'

/** Debian's browser, which playwright.config.ts starts. */
const CHROMIUM = '/usr/bin/chromium'

/** Installs Debian's Chromium with a font for its pages, unless a browser is there or named in CHROMIUM_PATH. */
export async function ensureChromium() {
  if (existsSync(process.env.CHROMIUM_PATH || CHROMIUM)) return
  await installDebianPackages('Chromium', ['chromium', 'fonts-liberation'])
}
