import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defaultClientConditions, defineConfig } from 'vite';
import { homeFonts, homePage } from './vite.home-page';

const apiTarget = process.env.LAMPWRIGHT_API_URL ?? 'http://127.0.0.1:3000';

const page = (file: string): string => fileURLToPath(new URL(file, import.meta.url));

export default defineConfig({
  plugins: [react(), homeFonts(), homePage(apiTarget)],
  resolve: { conditions: ['source', ...defaultClientConditions] },
  build: {
    outDir: 'dist',
    sourcemap: false,
    chunkSizeWarningLimit: 900,
    // The product, and the page that homeowners see, which takes nothing along but React.
    rollupOptions: { input: { index: page('index.html'), home: page('home.html') } },
  },
  server: { host: '127.0.0.1', proxy: { '/api': { target: apiTarget }, '/dev': { target: apiTarget } } },
});
