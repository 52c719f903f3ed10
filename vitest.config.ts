import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    maxWorkers: 2,
    projects: [
      {
        test: {
          name: 'unit',
          environment: 'node',
          include: ['tests/shared/**/*.test.ts'],
        },
      },
      {
        plugins: [react()],
        define: { __BUILD_ID__: JSON.stringify('test') },
        test: {
          name: 'client',
          environment: 'jsdom',
          include: ['tests/client/**/*.test.{ts,tsx}'],
          setupFiles: ['tests/support/client-setup.ts'],
        },
      },
      {
        test: {
          name: 'integration',
          environment: 'node',
          include: ['tests/{server,workers,architecture,faults,scripts}/**/*.test.ts'],
          // Starts the test cluster unless `npm test` has, and makes the template database once.
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: 20_000,
          // A hook may clone a database or launch the whole product.
          hookTimeout: 240_000,
        },
      },
    ],
  },
});
