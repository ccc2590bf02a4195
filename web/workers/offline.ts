/**
 * Serves the page without a network. The build puts in what the page consists of, each file with a revision that follows from its bytes; everything is
 * fetched once after the first load, but phrases only when they are played. A newer version is fetched beside this one, shares what has not changed, and
 * takes over when the page is loaded anew and no other tab shows it.
 */
declare const FETTLE_FILES: Readonly<Record<string, string>>;
declare const FETTLE_ON_DEMAND: readonly string[];

const files = FETTLE_FILES;
const onDemand = FETTLE_ON_DEMAND;
const worker = self as unknown as ServiceWorkerGlobalScope;
const CACHE = 'fettle-page';
const PAGE = 'index.html';
const TAKE_OVER = 'take over';

worker.addEventListener('install', (event) => event.waitUntil(fetchAll()));
worker.addEventListener('activate', (event) => event.waitUntil(clearOld().then(() => worker.clients.claim())));
worker.addEventListener('message', ({ data }) => {
  if (data === TAKE_OVER) void worker.skipWaiting();
});
worker.addEventListener('fetch', (event) => {
  const path = pathOf(event.request);
  if (path === null) return;
  event.respondWith(event.request.mode === 'navigate' ? givePage(path) : give(path));
});

async function fetchAll(): Promise<void> {
  const cache = await caches.open(CACHE);
  const paths = Object.keys(files).filter((path) => !onDemand.includes(path));
  await Promise.all(paths.map(async (path) => (await known(cache, path)) ?? fetchAnew(cache, path)));
}

async function clearOld(): Promise<void> {
  const cache = await caches.open(CACHE);
  const wanted = new Set(Object.keys(files).map(keyOf));
  const old = (await cache.keys()).filter(({ url }) => !wanted.has(url));
  await Promise.all(old.map((request) => cache.delete(request)));
}

async function givePage(path: string): Promise<Response> {
  const { waiting } = worker.registration;
  const tabs = await worker.clients.matchAll({ type: 'window' });
  if (waiting === null || tabs.length > 1) return give(path);
  waiting.postMessage(TAKE_OVER);
  return new Response('', { headers: { 'Content-Type': 'text/html', Refresh: '0' } });
}

async function give(path: string): Promise<Response> {
  const cache = await caches.open(CACHE);
  return (await known(cache, path)) ?? fetchAnew(cache, path);
}

function known(cache: Cache, path: string): Promise<Response | undefined> {
  return cache.match(keyOf(path), { ignoreVary: true });
}

async function fetchAnew(cache: Cache, path: string): Promise<Response> {
  const response = await fetch(urlOf(path), { cache: 'no-cache' });
  if (!response.ok) throw new Error(`“${path}” could not be fetched: the answer was ${response.status}.`);
  // A page that was reached by a redirection may not be given in answer to a navigation.
  const whole = response.redirected ? new Response(response.body, { headers: response.headers }) : response;
  await cache.put(keyOf(path), whole.clone());
  return whole;
}

/** Null for what this page does not consist of. */
function pathOf({ method, url }: Request): string | null {
  const { scope } = worker.registration;
  const plain = url.replace(/[?#].*$/, '');
  if (method !== 'GET' || !plain.startsWith(scope)) return null;
  const path = plain === scope ? PAGE : plain.slice(scope.length);
  return Object.hasOwn(files, path) ? path : null;
}

function urlOf(path: string): string {
  return path === PAGE ? worker.registration.scope : `${worker.registration.scope}${path}`;
}

function keyOf(path: string): string {
  return `${urlOf(path)}?${files[path]}`;
}
