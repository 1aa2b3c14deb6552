import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

const apiOrigin = process.env.API_ORIGIN ?? 'http://127.0.0.1:3000';

export default defineConfig({
  root: 'client',
  plugins: [react(), tailwindcss()],
  build: { outDir: '../dist/client', emptyOutDir: true, target: 'es2022' },
  server: {
    host: '127.0.0.1',
    strictPort: true,
    proxy: { '/api': apiOrigin, '/healthz': apiOrigin, '/readyz': apiOrigin },
  },
});
