import { dirname, relative, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import pluginVue from 'eslint-plugin-vue'
import tseslint from 'typescript-eslint'

const ROOT = dirname(fileURLToPath(import.meta.url))

/** What each folder may import from this repository, itself included; the first entry that fits decides. */
const MAY_IMPORT = {
  'shared': ['shared'],
  'app': ['app', 'shared'],
  'server/database': ['server/database', 'server/settings', 'shared'],
  'server/services': ['server/services', 'server/database', 'server/settings', 'shared'],
  'server/jobs': ['server/jobs', 'server/services', 'server/database', 'server/settings', 'server/utils', 'shared'],
  'server/commands': ['server', 'shared', 'fixtures/demo', 'fixtures/checks'],
  'server': ['server/api', 'server/routes', 'server/middleware', 'server/plugins', 'server/utils', 'server/jobs', 'server/services', 'server/database', 'server/settings', 'shared'],
  'fixtures': ['fixtures', 'shared'],
}

const ALIASES = [[/^#(shared|server|fixtures)\//, '$1/'], [/^(~~|@@)\//, ''], [/^(~|@)\//, 'app/']]

/** The imported file's path from the root, or null for a package. */
function pathOfImport(source, importer) {
  if (source.startsWith('.')) return relative(ROOT, resolve(dirname(importer), source))
  for (const [pattern, replacement] of ALIASES) if (pattern.test(source)) return source.replace(pattern, replacement)
  return null
}

const within = (path, folder) => path === folder || path.startsWith(`${folder}/`)

const importDirection = {
  meta: { type: 'problem', schema: [], messages: { wrongWay: '{{folder}} may import from {{allowed}} only, not {{path}}.' } },
  create(context) {
    const file = relative(ROOT, context.filename)
    const folder = Object.keys(MAY_IMPORT).find(name => within(file, name))
    if (!folder) return {}
    function check(node) {
      if (typeof node.source?.value !== 'string') return
      const path = pathOfImport(node.source.value, context.filename)
      if (path === null || MAY_IMPORT[folder].some(allowed => within(path.replace(/\.ts$/, ''), allowed))) return
      context.report({ node, messageId: 'wrongWay', data: { folder, path, allowed: MAY_IMPORT[folder].join(', ') } })
    }
    return { ImportDeclaration: check, ExportNamedDeclaration: check, ExportAllDeclaration: check, ImportExpression: check }
  },
}

const NOT_IN_NODE_20 = [['Promise', 'withResolvers'], ['Promise', 'try'], ['Array', 'fromAsync'], ['Object', 'groupBy'], ['Map', 'groupBy'], ['RegExp', 'escape'], ['Math', 'sumPrecise']]

const SESSION_CALLS = ['requireUserSession', 'setUserSession'].map(name => ({
  selector: `CallExpression[callee.name='${name}']`,
  message: 'A sealed cookie cannot be revoked and this call merges into it: use our guards and session rows.',
}))

export default tseslint.config(
  { ignores: ['node_modules/', '.nuxt/', '.output/', '.data/', '.build/', 'coverage/', 'test-results/', 'playwright-report/', 'server/database/migrations/'] },
  tseslint.configs.recommended,
  pluginVue.configs['flat/essential'],
  {
    files: ['**/*.vue'],
    languageOptions: { parserOptions: { parser: tseslint.parser } },
    rules: {
      'vue/block-lang': ['error', { script: { lang: 'ts' } }],
      'vue/component-api-style': ['error', ['script-setup']],
      'vue/no-v-html': 'error',
      'vue/require-explicit-emits': 'error',
      'vue/no-unused-refs': 'error',
    },
  },
  { files: ['app/{pages,layouts}/**/*.vue', 'app/{app,error}.vue'], rules: { 'vue/multi-word-component-names': 'off' } },
  {
    plugins: { coldslip: { rules: { 'import-direction': importDirection } } },
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      'coldslip/import-direction': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_', caughtErrors: 'all' }],
      'eqeqeq': 'error',
      'no-console': 'error',
      'no-restricted-properties': ['error', ...NOT_IN_NODE_20.map(([object, property]) => ({ object, property, message: 'Node 20 does not have it.' }))],
      'no-restricted-syntax': ['error', ...SESSION_CALLS],
      'max-lines': ['error', { max: 400, skipBlankLines: true, skipComments: true }],
      'semi': ['error', 'never'],
      'quotes': ['error', 'single', { avoidEscape: true, allowTemplateLiterals: true }],
      'comma-dangle': ['error', 'always-multiline'],
    },
  },
  { files: ['server/commands/**'], rules: { 'no-console': 'off' } },
  // What a test reads from the wire is looked at by the assertion, not by the compiler.
  { files: ['tests/**', 'fixtures/checks/**'], rules: { '@typescript-eslint/no-explicit-any': 'off' } },
  { files: ['server/api/**/*.ts'], rules: { 'max-lines': ['error', { max: 60 }] } },
  {
    files: ['shared/**/*.ts'],
    rules: {
      'no-restricted-imports': ['error', {
        patterns: [{
          group: ['node:*', 'vue', 'vue-router', 'pinia', 'h3', 'nitropack*', 'drizzle-orm*', 'postgres', 'pg-boss', '#imports', '#app'],
          message: 'shared/ runs in browser, worker and script alike.',
        }],
      }],
    },
  },
)
