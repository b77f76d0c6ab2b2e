import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

/** `npm run dev` passes the API's address; the built client is served by the API itself. */
const apiAddress = process.env['MILLPOND_API'] ?? 'http://127.0.0.1:4300';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: { outDir: 'dist/client', target: 'es2022', sourcemap: false, assetsInlineLimit: 0 },
  server: {
    host: '127.0.0.1',
    proxy: { '/api': apiAddress, '/auth': apiAddress, '/problems': apiAddress },
  },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          include: [
            'tests/{domain,contracts,architecture}/**/*.test.ts',
            'tests/client/**/*.test.{ts,tsx}',
          ],
          environment: 'node',
          // Property tests take long on a machine that does other work at the same time.
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'services',
          include: ['tests/{api,worker,db,fakes,faults,scripts}/**/*.test.ts'],
          environment: 'node',
          testTimeout: 60_000,
          hookTimeout: 120_000,
          maxWorkers: 2,
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          environment: 'node',
          testTimeout: 180_000,
          hookTimeout: 240_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
