import { defineConfig } from 'vitest/config';

// Without the `module` condition: packages load as plain Node would load them.
const conditions = ['source', 'node'];

export default defineConfig({
  resolve: { conditions },
  ssr: { resolve: { conditions } },
  test: {
    include: ['src/**/*.spec.ts', 'test/**/*.spec.ts'],
    globalSetup: ['test/global-setup.ts'],
    testTimeout: 90_000,
    hookTimeout: 120_000,
    retry: 0,
    // Specs wait on the database and the disk as much as they compute: one a core keeps two cores busy.
    maxWorkers: 2,
    // What a spec changes is in a database of its own. Loading Nest, Drizzle and the SDKs anew for each file
    // took more than half of the time.
    isolate: false,
  },
});
