import { defineConfig } from 'vitest/config'

// Tests run in an odd time zone, so that a local time slipping into a result shows.
process.env.TZ = 'Asia/Kathmandu'

export default defineConfig({
  test: {
    projects: [
      { test: { name: 'unit', include: ['tests/unit/**/*.test.ts'] } },
      { test: { name: 'database', include: ['tests/database/**/*.test.ts'], testTimeout: 60_000, hookTimeout: 120_000 } },
      { test: { name: 'http', include: ['tests/{http,faults}/**/*.test.ts'], testTimeout: 60_000, hookTimeout: 180_000, fileParallelism: false } },
    ],
  },
})
