import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  plugins: [react()],
  resolve: { conditions: ['@stayledger/source', 'module', 'browser', 'development'] },
  ssr: { resolve: { conditions: ['@stayledger/source', 'node', 'module'] } },
  test: {
    environment: 'jsdom',
    include: ['src/**/*.spec.ts', 'src/**/*.spec.tsx'],
    setupFiles: ['src/testing/setup.ts'],
    // A zone with an odd offset and a date line of its own: a day that shifts shows at once.
    env: { TZ: 'Pacific/Chatham' },
    restoreMocks: true,
    unstubGlobals: true,
    // Antd's first drawing in jsdom takes seconds on a busy machine of two cores.
    testTimeout: 60_000,
    maxWorkers: 2,
  },
});
