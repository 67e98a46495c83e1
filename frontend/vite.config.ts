import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

export default defineConfig(({ mode }) => ({
  plugins: [react()],
  resolve: {
    // Our own condition reads the workspaces' sources; it is scoped because packages below antd export one named `source`.
    conditions: [
      '@stayledger/source',
      'module',
      'browser',
      mode === 'production' ? 'production' : 'development',
    ],
  },
  html: {
    // The server replaces this text in index.html by a fresh nonce per response; antd's style elements carry it.
    cspNonce: '__CSP_NONCE__',
  },
  build: { target: 'es2022', sourcemap: false, assetsInlineLimit: 0, chunkSizeWarningLimit: 900 },
  server: { proxy: { '/api': 'http://127.0.0.1:3000' } },
}));
