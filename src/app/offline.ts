/** Makes the opened program work without a network from then on, where the browser allows it (see public/offline.js). */
export const keepForOffline = async (): Promise<void> => {
  if (!import.meta.env.PROD || !('serviceWorker' in navigator)) return
  try {
    await navigator.serviceWorker.register(new URL('offline.js', document.baseURI))
    const { active } = await navigator.serviceWorker.ready
    const loaded = performance.getEntriesByType('resource').map(({ name }) => name)
    const page = location.href.replace(/#.*$/, '')
    const urls = [...new Set([page, ...loaded])].filter((url) => url.startsWith(new URL('.', document.baseURI).href))
    active?.postMessage({ version: new URL(import.meta.url).pathname, urls })
  } catch (error) {
    // Private windows and plain http refuse; the program works all the same while there is a network.
    console.info('Not kept for use without a network.', error)
  }
}
