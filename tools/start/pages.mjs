// Vite's development server for the pages, as a process of its own; /api goes to the api. WEB_PORT, API_URL.
import { createServer } from 'vite';
import { inCheckout } from '../setup/checkout.mjs';

const target = process.env.API_URL ?? '';
const server = await createServer({
  root: inCheckout('apps/web'),
  server: { host: '127.0.0.1', port: Number(process.env.WEB_PORT), strictPort: true, proxy: { '/api': { target, changeOrigin: false } } },
});
await server.listen();
