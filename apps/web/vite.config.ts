import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  // The API puts this answer's nonce in place of the word; nothing is inlined that the policy would refuse.
  html: { cspNonce: '__CSP_NONCE__' },
  build: { assetsInlineLimit: 0, modulePreload: { polyfill: false } },
  server: { proxy: { '/api': 'http://127.0.0.1:4180' } },
});
