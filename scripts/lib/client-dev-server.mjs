// Vite's development server as a child of `npm run dev`: node client-dev-server.mjs <port> <server address>
import { join } from 'node:path';
import { createServer } from 'vite';
import { root } from './paths.mjs';

const [port, server] = process.argv.slice(2);
const vite = await createServer({
  root: join(root, 'client'),
  configFile: join(root, 'client/vite.config.ts'),
  clearScreen: false,
  server: {
    port: Number(port),
    strictPort: true,
    host: '127.0.0.1',
    proxy: { '/api': server, '/socket.io': { target: server, ws: true } },
  },
});
await vite.listen();
process.on('SIGTERM', () => void vite.close().finally(() => process.exit(0)));
