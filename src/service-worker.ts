/**
 * Keeps the built pages for times without a connection, so that `/try` opens, reads and calculates offline. Pages come
 * from the network while there is one; files of a build carry their hash in the name and come from here. The API is
 * never touched: what the server says is not kept, and nothing pretends to be sent.
 */
declare const __OFFLINE_FILES__: { readonly build: string; readonly files: readonly string[] }; // the build puts it in

interface WaitingEvent extends Event {
  waitUntil(work: Promise<unknown>): void;
}
interface AskedEvent extends Event {
  readonly request: Request;
  respondWith(answer: Promise<Response>): void;
}
interface ServiceWorkerSelf {
  skipWaiting(): Promise<void>;
  readonly clients: { claim(): Promise<void> };
  readonly location: Location;
  addEventListener(type: 'install' | 'activate', listener: (event: WaitingEvent) => void): void;
  addEventListener(type: 'fetch', listener: (event: AskedEvent) => void): void;
}
const worker = self as unknown as ServiceWorkerSelf;
const { build, files } = __OFFLINE_FILES__;
const CACHE = `hummock-${build}`;
const PAGE = '/';

async function install(): Promise<void> {
  const cache = await caches.open(CACHE);
  await cache.addAll([PAGE, ...files]);
  await worker.skipWaiting();
}

async function activate(): Promise<void> {
  for (const name of await caches.keys()) {
    if (name.startsWith('hummock-') && name !== CACHE) await caches.delete(name);
  }
  await worker.clients.claim();
}

/** The page as it is now, or as it was kept: every address of the app is the same page. */
async function pageAnswer(request: Request): Promise<Response> {
  try {
    return await fetch(request);
  } catch (error) {
    const kept = await caches.match(PAGE);
    if (kept) return kept;
    throw error;
  }
}

async function fileAnswer(request: Request): Promise<Response> {
  return (await caches.match(request)) ?? fetch(request);
}

worker.addEventListener('install', (event) => event.waitUntil(install()));
worker.addEventListener('activate', (event) => event.waitUntil(activate()));
worker.addEventListener('fetch', (event) => {
  const { request } = event;
  const { origin, pathname } = new URL(request.url);
  if (request.method !== 'GET' || origin !== worker.location.origin || pathname.startsWith('/api/')) return;
  if (request.mode === 'navigate') event.respondWith(pageAnswer(request));
  else if (files.includes(pathname)) event.respondWith(fileAnswer(request));
});
