import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: { conditions: ['@stayledger/source', 'node', 'module'] },
  ssr: { resolve: { conditions: ['@stayledger/source', 'node', 'module'] } },
  test: { include: ['*.spec.ts'], env: { TZ: 'Pacific/Chatham' } },
});
