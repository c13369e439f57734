import react from '@vitejs/plugin-react';
import { defaultClientConditions } from 'vite';
import { defineConfig } from 'vitest/config';

const conditions = ['source', ...defaultClientConditions];

export default defineConfig({
  plugins: [react()],
  resolve: { conditions },
  ssr: { resolve: { conditions } },
  test: {
    environment: 'node',
    testTimeout: 30_000,
    retry: 0,
    projects: [
      {
        extends: true,
        // Stores, tools and sums keep nothing between files: loading them anew for each would take most of the time.
        test: { name: 'logic', include: ['src/**/*.spec.ts'], isolate: false },
      },
      {
        extends: true,
        // A document and what hangs on it is each file's own.
        test: { name: 'screens', include: ['src/**/*.spec.tsx'] },
      },
    ],
  },
});
