import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: { conditions: ['@stayledger/source', 'module', 'development'] },
  ssr: { resolve: { conditions: ['@stayledger/source', 'node', 'module'] } },
  test: {
    include: ['src/**/*.spec.ts'],
    // A zone with an odd offset: nothing in here may depend on where it runs.
    env: { TZ: 'Pacific/Chatham' },
    testTimeout: 20_000,
    maxWorkers: 2,
  },
});
