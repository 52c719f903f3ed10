import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

/** The web's address behind Vite in development; a build does not use it. */
const webUrl = process.env.WEB_URL ?? 'http://127.0.0.1:4601';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  define: { __BUILD_ID__: JSON.stringify(process.env.BUILD_ID ?? 'development') },
  build: {
    outDir: 'dist/client',
    emptyOutDir: true,
    manifest: true,
    // The content policy allows no data: fonts or scripts, so nothing is inlined.
    assetsInlineLimit: 0,
    reportCompressedSize: false,
  },
  server: {
    host: process.env.HOST ?? '127.0.0.1',
    port: Number(process.env.PORT ?? 4600),
    strictPort: true,
    proxy: {
      '/api': webUrl,
      '/outbox': webUrl,
      '/healthz': webUrl,
      '/readyz': webUrl,
      '/socket.io': { target: webUrl, ws: true },
    },
  },
});
