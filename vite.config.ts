import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

/** The address of the API while `npm run dev` runs: the page comes from Vite, everything under /api from there. */
const apiTarget = process.env.DEV_API_URL ?? 'http://127.0.0.1:5171';

export default defineConfig({
  root: 'web',
  plugins: [react(), tailwindcss()],
  build: {
    outDir: '../dist/web',
    emptyOutDir: true,
    target: 'es2023',
    sourcemap: false,
    // Tells which part needs which; the weight of a page is reckoned from it.
    manifest: true,
    chunkSizeWarningLimit: 400,
  },
  server: {
    host: process.env.HOST ?? '127.0.0.1',
    port: Number(process.env.PORT ?? 5170),
    strictPort: true,
    proxy: {
      '/api': { target: apiTarget },
      '/demo': { target: apiTarget },
      '/healthz': { target: apiTarget },
      '/readyz': { target: apiTarget },
      '/metrics': { target: apiTarget },
    },
  },
});
