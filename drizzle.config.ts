import { defineConfig } from 'drizzle-kit'

export default defineConfig({
  dialect: 'postgresql',
  schema: ['organisations', 'instruments', 'subjects', 'limits', 'submissions', 'readings', 'audit', 'certificates'].map(domain => `./server/database/schema/${domain}.ts`),
  out: './server/database/migrations',
})
