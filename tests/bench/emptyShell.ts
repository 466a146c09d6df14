import { createServer, type Server } from 'node:http';
import { freePort } from '../e2e/support/realServer';

const page = `<!doctype html><title>empty</title><p id="ready" hidden>ready</p><script>
navigator.serviceWorker.register('/sw.js');document.getElementById('ready').hidden=false</script>`;
const worker = `self.addEventListener('install',e=>{e.waitUntil(caches.open('a').then(c=>c.add('/')));self.skipWaiting()});
self.addEventListener('activate',e=>e.waitUntil(self.clients.claim()));
self.addEventListener('fetch',e=>e.respondWith(caches.match('/')));`;

/** The least that can start without a network: one line of a page behind one service worker. */
export async function emptyShell(): Promise<{ address: string; server: Server }> {
  const port = await freePort();
  const server = createServer((request, response) => {
    const isWorker = request.url === '/sw.js';
    response.setHeader('content-type', isWorker ? 'text/javascript' : 'text/html');
    response.end(isWorker ? worker : page);
  });
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
  return { address: `http://127.0.0.1:${port}`, server };
}
