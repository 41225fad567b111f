// Keeps one whole version of the app and serves it, with the network or without.
//
// Workbox fetches every file of the new version, checked against its hash, before the old one goes;
// a version takes over only when no page of the old one is open. Names carry hashes, so versions
// cannot mix.
import {
  addPlugins, cleanupOutdatedCaches, createHandlerBoundToURL, precacheAndRoute,
} from 'workbox-precaching';
import { NavigationRoute, registerRoute } from 'workbox-routing';

const total = PRECACHE.reduce((sum, { bytes }) => sum + bytes, 0);
const size = new Map(PRECACHE.map(({ url, bytes }) => [new URL(url, location).href, bytes]));
let done = 0;

// Files that came wrong. The browser may keep a wrong answer for as long as the right one; the next
// try asks the host again.
const SUSPECTS = 'suspects';
const suspect = async ({ url }) => (await caches.open(SUSPECTS)).put(url, new Response());

addPlugins([{
  async requestWillFetch({ request, event }) {
    if (event.type !== 'install' || !await caches.match(request.url, { cacheName: SUSPECTS })) return request;
    return new Request(request, { cache: 'reload' });
  },
  fetchDidFail: ({ request, event }) => event.type === 'install' && suspect(request),
  // A static host sets no policy; what is kept here is served with the project's own headers.
  async cacheWillUpdate({ request, response }) {
    if (response.status !== 200) return suspect(request).then(() => null);
    const type = response.headers.get('Content-Type') ?? 'application/octet-stream';
    return new Response(response.body, { headers: { 'Content-Type': type, ...HEADERS } });
  },
  async handlerDidComplete({ request, event }) {
    if (event.type !== 'install') return;
    done += size.get(request.url) ?? 0;
    for (const client of await self.clients.matchAll({ includeUncontrolled: true, type: 'window' })) {
      client.postMessage({ type: 'precache', done, total });
    }
  },
}]);
self.addEventListener('activate', (event) => event.waitUntil(caches.delete(SUSPECTS)));

precacheAndRoute(PRECACHE.map(({ url, revision, integrity }) => ({ url, revision, integrity })));
cleanupOutdatedCaches();
// Any address in the app's folder opens the app, whatever a shared link carries behind it.
registerRoute(new NavigationRoute(createHandlerBoundToURL('index.html')));
