import { defineConfig, mergeConfig } from 'vitest/config';
import viteConfig from './vite.config.js';

/**
 * node: pure code and everything that needs PostgreSQL or Redis (*.integration.test.ts).
 * client: components and composables in happy-dom.
 * e2e and faults: real processes and a real browser; they share one machine, so one file at a time.
 */
export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/{shared,server,worker,bench}/**/*.test.ts'],
          exclude: ['**/*.integration.test.ts'],
          testTimeout: 30_000,
        },
      },
      {
        test: {
          name: 'integration',
          environment: 'node',
          pool: 'forks',
          include: ['tests/{server,worker}/**/*.integration.test.ts'],
          setupFiles: ['tests/support/integrationSetup.ts'],
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
      mergeConfig(viteConfig, {
        test: {
          name: 'client',
          environment: 'happy-dom',
          include: ['tests/src/**/*.test.ts'],
          setupFiles: ['tests/support/client/clientSetup.ts'],
          server: { deps: { inline: ['vuetify'] } },
        },
      }),
      {
        test: {
          name: 'system',
          environment: 'node',
          pool: 'forks',
          include: ['tests/{faults,e2e}/**/*.test.ts'],
          fileParallelism: false,
          testTimeout: 180_000,
          hookTimeout: 180_000,
        },
      },
    ],
  },
});
