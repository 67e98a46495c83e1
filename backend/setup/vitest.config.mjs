import { defineConfig } from 'vitest/config';

/** Specs of the set-up scripts themselves and of the lint rules. */
export default defineConfig({
  test: {
    environment: 'node',
    include: ['backend/setup/**/*.spec.mjs'],
    env: { TZ: 'Pacific/Chatham' },
    testTimeout: 60_000,
    maxWorkers: 2,
  },
});
