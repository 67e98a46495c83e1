import { defineConfig } from 'vitest/config';

/** Browser journeys against the real stack, one file after the other: two cores, one browser. */
export default defineConfig({
  resolve: { conditions: ['@stayledger/source', 'node', 'module'] },
  ssr: { resolve: { conditions: ['@stayledger/source', 'node', 'module'] } },
  test: {
    environment: 'node',
    include: ['e2e/**/*.e2e.ts'],
    globalSetup: ['e2e/harness/global-setup.ts'],
    env: { TZ: 'Pacific/Chatham' },
    fileParallelism: false,
    testTimeout: 120_000,
    hookTimeout: 180_000,
  },
});
