import { fileURLToPath } from 'node:url'
import { FONT_FILES } from './server/services/certificates/pdf/fonts'

const CERTIFICATE_FONTS = Object.values(FONT_FILES)

// Everything that changes how Coldslip is built. What changes how it runs is in server/settings.ts.
export default defineNuxtConfig({
  compatibilityDate: '2026-11-01',
  modules: ['@pinia/nuxt', '@nuxtjs/tailwindcss', 'nuxt-auth-utils'],
  devtools: { enabled: false },
  telemetry: false,
  css: ['~/assets/css/main.css'],
  tailwindcss: { cssPath: '~/assets/css/main.css' },
  components: [{ path: '~/components', pathPrefix: false }],
  imports: { dirs: ['composables/**', 'stores'] },
  // The sign-in state is ours (a session row); the module only seals the cookie.
  auth: { loadStrategy: 'none' },
  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      title: 'Coldslip',
      meta: [
        { name: 'viewport', content: 'width=device-width, initial-scale=1' },
        { name: 'color-scheme', content: 'light dark' },
      ],
      link: [{ rel: 'icon', type: 'image/svg+xml', href: '/favicon.svg' }],
    },
  },
  runtimeConfig: {
    session: {
      name: 'coldslip-session',
      password: '',
      maxAge: 60 * 60 * 24 * 7,
      cookie: { sameSite: 'lax', httpOnly: true, path: '/', secure: false },
      sessionHeader: false,
    },
  },
  typescript: { strict: true, tsConfig: { compilerOptions: { noUncheckedIndexedAccess: true } } },
  vite: { build: { chunkSizeWarningLimit: 900 } },
  nitro: {
    preset: 'node-server',
    esbuild: { options: { target: 'node20' } },
    // Fonts of the certificates (server/services/certificates/pdf/fonts.ts): read by path, so the tracer does not see them.
    externals: { inline: [], traceInclude: CERTIFICATE_FONTS.map(file => fileURLToPath(new URL(`./node_modules/${file}`, import.meta.url))) },
    // The stand-alone checker of certificates, for whoever holds one.
    publicAssets: [{ baseURL: 'certificates', dir: fileURLToPath(new URL('./fixtures/certificates', import.meta.url)), maxAge: 300 }],
    alias: { '#server': fileURLToPath(new URL('./server', import.meta.url)) },
  },
})
