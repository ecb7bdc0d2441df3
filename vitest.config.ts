import { mergeConfig, defineConfig } from 'vitest/config';
import viteConfig from './vite.config.ts';

/** The suites share one runner: reference and unit need nothing, api needs the throw-away cluster, browser also a built client. */
export default defineConfig((env) =>
  mergeConfig(viteConfig(env), {
    test: {
      projects: [
        { extends: true, test: { name: 'reference', include: ['tests/reference/**/*.test.ts'] } },
        { extends: true, test: { name: 'unit', include: ['tests/unit/**/*.test.ts'] } },
        {
          extends: true,
          test: {
            name: 'api',
            include: ['tests/api/**/*.test.ts', 'tests/faults/**/*.test.ts'],
            globalSetup: ['tests/support/cluster.setup.ts'],
            testTimeout: 30_000,
            hookTimeout: 60_000,
          },
        },
        {
          extends: true,
          test: {
            name: 'browser',
            include: ['tests/browser/**/*.test.ts'],
            // A page that a busy machine cut short is opened again; what fails twice more has failed.
            retry: 2,
            globalSetup: ['tests/support/cluster.setup.ts', 'tests/support/browser.setup.ts'],
            testTimeout: 120_000,
            hookTimeout: 120_000,
            fileParallelism: false,
          },
        },
      ],
    },
  }),
);
