import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  publicDir: 'src/public',
  // Replaced by a fresh nonce in every answer; see server/http/pages.ts.
  html: { cspNonce: 'STEMMA-NONCE' },
  build: {
    outDir: 'dist',
    // The content security policy allows neither inline scripts nor data: fonts.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
  },
  test: {
    // One database server and one browser on two cores: the time-outs are for a machine that is busy.
    maxWorkers: 2,
    testTimeout: 20_000,
    hookTimeout: 60_000,
    projects: [
      {
        extends: true,
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/**/*.test.ts'],
          exclude: ['tests/e2e/**'],
          // Loading mathjs afresh for each file took most of the time. No test replaces a module.
          isolate: false,
          globalSetup: ['tests/support/database-setup.ts'],
        },
      },
      {
        extends: true,
        test: { name: 'jsdom', environment: 'jsdom', include: ['tests/**/*.test.tsx'] },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          environment: 'node',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: ['tests/support/database-setup.ts', 'tests/support/client-setup.ts'],
          fileParallelism: false,
          // After the others: a browser that shares two cores with them would be slow at random.
          sequence: { groupOrder: 1 },
          testTimeout: 180_000,
          hookTimeout: 180_000,
        },
      },
    ],
  },
});
