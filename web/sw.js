// Keeps the page for use without a network. VERSION and FILES are put in by build.mjs: a hash of everything shipped, and the
// list of it. A version is fetched whole or not at all, and waits until the page says that the person wants it.
const prefix = 'groundgrain-';
const cacheName = prefix + VERSION;

async function fill() {
    const cache = await caches.open(cacheName);
    const names = await caches.keys();
    const older = await Promise.all(names.filter((n) => n.startsWith(prefix) && n !== cacheName).map((n) => caches.open(n)));
    await Promise.all(
        FILES.map(async (file) => {
            // A name with a hash in it means the same bytes for ever: copy them from the version before.
            const hashed = /-[0-9a-f]{10}\./.test(file);
            if (hashed) {
                for (const old of older) {
                    const kept = await old.match(file);
                    if (kept) return cache.put(file, kept);
                }
            }
            const answer = await fetch(file, { cache: hashed ? 'default' : 'no-cache' });
            if (!answer.ok) throw new Error(`${file}: ${answer.status}`);
            return cache.put(file, answer);
        }),
    );
}

self.addEventListener('install', (event) => event.waitUntil(fill()));
self.addEventListener('activate', (event) =>
    event.waitUntil(
        caches
            .keys()
            .then((names) => Promise.all(names.filter((n) => n.startsWith(prefix) && n !== cacheName).map((n) => caches.delete(n))))
            .then(() => self.clients.claim()),
    ),
);
self.addEventListener('message', (event) => {
    if (event.data === 'take over') self.skipWaiting();
});
self.addEventListener('fetch', (event) => {
    const { request } = event;
    if (request.method !== 'GET' || new URL(request.url).origin !== location.origin) return;
    event.respondWith(
        caches.open(cacheName).then(async (cache) => {
            const kept = await cache.match(request, { ignoreSearch: true });
            if (kept) return kept;
            return fetch(request).catch(async (reason) => {
                if (request.mode === 'navigate') return cache.match('./');
                throw reason;
            });
        }),
    );
});
