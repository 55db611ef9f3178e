// Service worker: the program works without a network once it has been opened. Files whose name carries a hash never
// change, so they come from the cache; all others come from the network as long as there is one.
const prefix = 'facetwright '
const isHashed = (url) => /\/assets\/[^/]+-[\w-]{8}\.\w+$/.test(url.pathname)

self.addEventListener('install', () => self.skipWaiting())
self.addEventListener('activate', (event) => event.waitUntil(self.clients.claim()))

const names = async () => (await caches.keys()).filter((name) => name.startsWith(prefix))
const keep = async (request, response) => {
  if (response.ok && response.type === 'basic') {
    const cache = await caches.open((await names()).at(-1) ?? prefix)
    await cache.put(request, response.clone())
  }
  return response
}
const kept = (request) => caches.match(request, { ignoreVary: true, ignoreSearch: request.mode === 'navigate' })

const answer = async (request) => {
  if (isHashed(new URL(request.url))) return (await kept(request)) ?? keep(request, await fetch(request))
  try {
    return await keep(request, await fetch(request))
  } catch (error) {
    const known = await kept(request)
    if (known) return known
    throw error
  }
}

// What the page loaded before there was a service worker; and the files of earlier versions go.
self.addEventListener('message', (event) => {
  const { version, urls } = event.data
  const fill = async () => {
    const mine = prefix + version
    const cache = await caches.open(mine)
    const known = new Set((await cache.keys()).map(({ url }) => url))
    await cache.addAll(urls.filter((url) => !known.has(url)))
    for (const name of await names()) if (name !== mine) await caches.delete(name)
  }
  event.waitUntil(fill())
})

self.addEventListener('fetch', (event) => {
  const { request } = event
  if (request.method === 'GET' && new URL(request.url).origin === location.origin) event.respondWith(answer(request))
})
