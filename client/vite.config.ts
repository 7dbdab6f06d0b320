import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'vite';

const server = 'http://127.0.0.1:4280';

/** React and the router change rarely; a chunk of their own stays in the browser's cache across releases. */
const framework =
  /node_modules\/(react|react-dom|react-router|react-router-dom|scheduler|@tanstack|socket\.io|engine\.io)/;
/** Chart.js is the only large library; it must never be part of the first load. */
const charting = /node_modules\/(chart\.js|react-chartjs-2|@kurkle)/;

export default defineConfig({
  root: fileURLToPath(new URL('.', import.meta.url)),
  plugins: [react(), tailwindcss()],
  build: {
    outDir: 'dist',
    emptyOutDir: true,
    sourcemap: true,
    // No data: addresses: the content policy allows fonts and images from the server only.
    assetsInlineLimit: 0,
    rolldownOptions: {
      output: {
        codeSplitting: {
          groups: [
            { name: 'charting', test: charting },
            { name: 'framework', test: framework },
          ],
        },
      },
    },
  },
  server: {
    port: 4281,
    proxy: {
      '/api': server,
      '/socket.io': { target: server, ws: true },
    },
  },
});
