/**
 * Keeps one piece of JSON under a name in this browser, through the platform's cache storage: roomy, and not in the way of the page. Where
 * there is none (a page without https, a sandboxed frame, a browser told to keep nothing) it lasts as long as the page, and `lasts` says so.
 */
export async function openKept(name) {
  const address = `./kept/${name}.json`;
  let memory = null;
  const store = await openStore();
  return {
    lasts: store !== null,
    async read() {
      try {
        const found = await store?.match(address);
        return found ? await found.json() : memory;
      } catch {
        return memory;
      }
    },
    async write(value) {
      memory = value;
      const headers = { 'content-type': 'application/json' };
      await store?.put(address, new Response(JSON.stringify(value), { headers })).catch(() => undefined);
    },
    async clear() {
      memory = null;
      await store?.delete(address).catch(() => undefined);
    },
  };
}

async function openStore() {
  try {
    return await caches.open('rillage-desk');
  } catch {
    return null;
  }
}
