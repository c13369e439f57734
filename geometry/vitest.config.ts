import { defaultServerConditions } from 'vite';
import { defineConfig } from 'vitest/config';

const conditions = ['source', ...defaultServerConditions];

export default defineConfig({
  resolve: { conditions },
  ssr: { resolve: { conditions } },
  test: {
    include: ['src/**/*.spec.ts', 'test/**/*.spec.ts'],
    testTimeout: 30_000,
    hookTimeout: 60_000,
    retry: 0,
    // Pure functions keep nothing between files: loading them anew for each would take most of the time.
    isolate: false,
  },
});
