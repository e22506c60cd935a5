import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

/** Where `npm run dev` has the server; the page itself is served by Vite, which passes the API on. */
const server = process.env.DEV_SERVER_ADDRESS ?? 'http://127.0.0.1:4180';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: {
    outDir: 'dist/client',
    emptyOutDir: true,
    target: 'es2022',
    // Every browser of that target knows modulepreload.
    modulePreload: { polyfill: false },
    // Sizes are watched by `npm run bench -- --only first-load`.
    reportCompressedSize: false,
  },
  server: {
    port: Number(process.env.DEV_PORT ?? 5180),
    strictPort: true,
    proxy: { '/api': server, '/healthz': server, '/readyz': server },
  },
});
