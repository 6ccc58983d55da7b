/**
 * The service worker: keeps the files of one build and answers from them. Put together with the list of files by the build.
 * Files of the build carry a hash in their name, so what is kept is never stale; a new build keeps a set of its own.
 */

declare const __PRECACHE__: { readonly version: string; readonly files: readonly string[] };

/** The parts of a service worker's scope that are used here; the page's own types know the window only. */
interface ServiceScope {
  readonly location: Location;
  skipWaiting(): Promise<void>;
  readonly clients: { claim(): Promise<void> };
  addEventListener(
    type: 'install' | 'activate',
    listen: (event: { waitUntil(work: Promise<unknown>): void }) => void,
  ): void;
  addEventListener(
    type: 'fetch',
    listen: (event: { readonly request: Request; respondWith(answer: Promise<Response>): void }) => void,
  ): void;
}
const scope = self as unknown as ServiceScope;

const storeName = `fillcast-${__PRECACHE__.version}`;

async function keepAll(): Promise<void> {
  const store = await caches.open(storeName);
  await store.addAll(__PRECACHE__.files.map((file) => new Request(file, { cache: 'reload' })));
  await scope.skipWaiting();
}

async function dropOld(): Promise<void> {
  const names = await caches.keys();
  await Promise.all(names.filter((n) => n.startsWith('fillcast-') && n !== storeName).map((n) => caches.delete(n)));
  await scope.clients.claim();
}

/** The kept answer with the headers that let the page share memory between its workers, also on hosts that send none. */
function isolated(kept: Response): Response {
  const headers = new Headers(kept.headers);
  headers.set('Cross-Origin-Opener-Policy', 'same-origin');
  headers.set('Cross-Origin-Embedder-Policy', 'require-corp');
  headers.set('Cross-Origin-Resource-Policy', 'same-origin');
  return new Response(kept.body, { status: kept.status, statusText: kept.statusText, headers });
}

async function answer(request: Request): Promise<Response> {
  const store = await caches.open(storeName);
  const wanted = request.mode === 'navigate' ? './index.html' : request;
  const kept = await store.match(wanted, { ignoreSearch: true, ignoreVary: true });
  return kept === undefined ? fetch(request) : isolated(kept);
}

scope.addEventListener('install', (event) => event.waitUntil(keepAll()));
scope.addEventListener('activate', (event) => event.waitUntil(dropOld()));
scope.addEventListener('fetch', (event) => {
  const { request } = event;
  if (request.method === 'GET' && new URL(request.url).origin === scope.location.origin)
    event.respondWith(answer(request));
});
