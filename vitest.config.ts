import { fileURLToPath } from 'node:url';
import { quasar, transformAssetUrls } from '@quasar/vite-plugin';
import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vitest/config';

const sassVariables = fileURLToPath(new URL('./src/css/quasar-variables.scss', import.meta.url));

export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'engine',
          environment: 'node',
          include: ['tests/engine/**/*.test.ts', 'tests/shared/**/*.test.ts', 'tests/data/**/*.test.ts'],
        },
      },
      { test: { name: 'reference', environment: 'node', include: ['tests/reference/**/*.test.ts'] } },
      {
        test: {
          name: 'api',
          environment: 'node',
          include: ['tests/api/**/*.test.ts', 'tests/faults/**/*.test.ts', 'tests/setup/**/*.test.ts'],
          globalSetup: ['tests/api/support/global-setup.ts'],
          testTimeout: 60_000,
          hookTimeout: 120_000,
          maxWorkers: 2,
        },
      },
      {
        plugins: [vue({ template: { transformAssetUrls } }), quasar({ sassVariables })],
        test: { name: 'client', environment: 'happy-dom', include: ['tests/client/**/*.test.ts'] },
      },
      {
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/browser/harness/global-setup.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          maxWorkers: 1,
          fileParallelism: false,
        },
      },
    ],
  },
});
