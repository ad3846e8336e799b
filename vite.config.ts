import { fileURLToPath } from 'node:url';

import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const source = fileURLToPath(new URL('./src', import.meta.url));

export default defineConfig(({ isSsrBuild }) => ({
  plugins: [react(), tailwindcss()],
  resolve: { alias: { '@': source } },
  worker: { format: 'es' },
  build: isSsrBuild
    ? { outDir: 'dist/server', emptyOutDir: true, target: 'node20' }
    : { outDir: 'dist/client', emptyOutDir: true, target: 'es2022', assetsInlineLimit: 0 },
  server: { proxy: { '/api': 'http://127.0.0.1:4100' } },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'engine',
          environment: 'node',
          setupFiles: ['tests/support/property-seed.ts'],
          include: ['tests/{engine,problems,presets,batch,workers}/**/*.test.ts'],
          testTimeout: 30_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'server',
          environment: 'node',
          include: ['tests/server/**/*.test.ts'],
          testTimeout: 30_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'features',
          environment: 'jsdom',
          include: ['tests/{features,components,graphics}/**/*.test.{ts,tsx}'],
          setupFiles: ['tests/support/jsdom-setup.ts'],
          testTimeout: 30_000,
        },
      },
    ],
  },
}));
