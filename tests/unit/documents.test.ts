import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'

const inRepository = (path: string): string => fileURLToPath(new URL(`../../${path}`, import.meta.url))
const textOf = (path: string): string => readFileSync(inRepository(path), 'utf8')

const scripts: Record<string, string> = JSON.parse(textOf('package.json')).scripts
/** Folders that are made while working, so no path in them can be asked for. */
const made = new Set(textOf('.gitignore').split('\n').map(line => line.replace(/\/$/, '')))

const withoutFences = (markdown: string): string => markdown.replace(/^```[\s\S]*?^```/gm, '')
const quoted = (markdown: string): string[] => [...withoutFences(markdown).matchAll(/`([^`\n]+)`/g)].map(match => match[1]!)
const unique = (texts: string[]): string[] => [...new Set(texts)]

/** A file of the root, or something with a slash that begins like a folder of the root or ends like a file or folder. */
function looksLikePath(text: string): boolean {
  if (!text.includes('/')) return /^(?:[\w-]+(?:\.[\w-]+)*\.(?:md|ts|mjs|json|vue)|\.env\.example)$/.test(text)
  if (!/^[.\w-]+\/[\w.[\]/-]*$/.test(text)) return false
  const first = text.split('/')[0]!
  return !made.has(first) && (existsSync(inRepository(first)) || /(?:\/|\.\w+)$/.test(text))
}

/** An address of the server: a page, a route, or a folder of handlers. */
function isServed(address: string): boolean {
  return [`app/pages${address}.vue`, `app/pages${address}/index.vue`, `server/routes${address}.get.ts`, `server${address}`].some(path => existsSync(inRepository(path)))
}

const anchorOf = (heading: string): string => heading.toLowerCase().replace(/[^\w\s-]/g, '').trim().replace(/\s+/g, '-')

describe.each(['README.md', 'DEVELOPERS.md'])('%s', (name) => {
  const markdown = textOf(name)

  it('names only paths that exist', () => {
    const paths = unique(quoted(markdown).filter(looksLikePath))
    expect(paths.filter(path => !existsSync(inRepository(path)))).toEqual([])
  })

  it('names only addresses that are served', () => {
    const addresses = unique(quoted(markdown).filter(text => /^\/(?!usr\/)[a-z][\w./-]*$/.test(text)))
    expect(addresses.filter(address => !isServed(address))).toEqual([])
  })

  it('links and shows only what exists', () => {
    const targets = [...withoutFences(markdown).matchAll(/\]\(([^)\s]+)\)/g)].map(match => match[1]!)
    const anchors = new Set([...markdown.matchAll(/^#+ (.+)$/gm)].map(match => `#${anchorOf(match[1]!)}`))
    expect(targets.length).toBeGreaterThan(0)
    expect(targets.filter(target => target.startsWith('#') ? !anchors.has(target) : !/^https?:/.test(target) && !existsSync(inRepository(target)))).toEqual([])
  })

  it('names only scripts of package.json', () => {
    const called = [...markdown.matchAll(/\bnpm (?:run ([\w:-]+)|(start|test)\b)/g)].map(match => match[1] ?? match[2]!)
    expect(called).toEqual(expect.arrayContaining(['start', 'test']))
    expect(unique(called).filter(script => !(script in scripts))).toEqual([])
  })
})

describe('what DEVELOPERS.md must have', () => {
  const markdown = textOf('DEVELOPERS.md')
  const settingsSection = /^## Settings\n([\s\S]*?)^## /m.exec(markdown)![1]!
  const inTable = [...settingsSection.matchAll(/^\| `([A-Z][A-Z_]+)` \|/gm)].map(match => match[1]!)
  const inSettings = [...textOf('server/settings.ts').matchAll(/^ {2}([A-Z][A-Z_]+): z\./gm)].map(match => match[1]!)
  const inExample = [...textOf('.env.example').matchAll(/^#?([A-Z][A-Z_]+)=/gm)].map(match => match[1]!)

  it.each(['shared', 'server'])('every folder of %s', (parent) => {
    const paths = quoted(markdown).filter(looksLikePath)
    const folders = readdirSync(inRepository(parent), { withFileTypes: true }).filter(entry => entry.isDirectory()).map(entry => `${parent}/${entry.name}/`)
    expect(folders.length).toBeGreaterThan(5)
    expect(folders.filter(folder => !paths.includes(folder))).toEqual([])
  })

  it('every script', () => {
    const missing = Object.keys(scripts).filter(script => !markdown.includes(script === 'start' || script === 'test' ? `npm ${script}` : `npm run ${script}`))
    expect(missing).toEqual([])
  })

  it('every setting, once', () => {
    expect(inSettings).toContain('DATABASE_URL')
    expect(inExample).toContain('DATABASE_URL')
    expect(unique([...inSettings, ...inExample]).filter(setting => !inTable.includes(setting))).toEqual([])
    expect(inTable).toEqual(unique(inTable))
  })

  it('no setting that nothing reads', () => {
    const readers = ['server/settings.ts', 'playwright.config.ts', 'server/commands/setup/start-coldslip.mjs', 'server/commands/setup/database.mjs', 'server/commands/setup/postgres-binaries.mjs'].map(textOf).join('\n')
    // The rest comes through Nuxt: NUXT_SESSION_COOKIE_SECURE is session.cookie.secure of its runtimeConfig.
    const configured = (setting: string) => {
      const [prefix, ...members] = setting.toLowerCase().split('_')
      return prefix === 'nuxt' && new RegExp(['runtimeConfig', ...members].join(':[\\s\\S]*?\\b') + ':').test(textOf('nuxt.config.ts'))
    }
    expect(inTable.filter(setting => !new RegExp(`\\b${setting}\\b`).test(readers) && !configured(setting))).toEqual([])
  })
})

describe('.env.example', () => {
  it('offers every setting but the one that the start command makes itself', () => {
    const example = textOf('.env.example')
    const settings = [...textOf('server/settings.ts').matchAll(/^ {2}([A-Z][A-Z_]+): z\./gm)].map(match => match[1]!)
    expect(settings.filter(setting => !new RegExp(`^#?${setting}=`, 'm').test(example))).toEqual(['COLDSLIP_DEMO_FILE'])
  })
})
