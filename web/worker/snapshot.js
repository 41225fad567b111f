// Python's memory as it was when the engine had just started, kept on the device: the next start
// takes it up in a fraction of the time.
//
// It is made here and not shipped: it would be the largest file of all to fetch, and made here it
// always fits the runtime that made it. The snapshot is an experiment of Pyodide's: everything here
// may fail, and then the plain start does.

const STORE = 'engine-start';
// The worker's own name has a hash of all that the snapshot depends on: it is the snapshot's key.
const KEY = `${self.location.pathname}.snapshot`;
const LENGTH = 'X-Length';

/** The snapshot of this very version, still being read, or null. */
export async function storedSnapshot() {
  try {
    const found = await self.caches?.match(KEY, { cacheName: STORE });
    return found ? { bytes: checked(found) } : null;
  } catch {
    return null;
  }
}

async function checked(found) {
  const bytes = new Uint8Array(await found.arrayBuffer());
  if (bytes.length !== Number(found.headers.get(LENGTH))) throw new Error('the snapshot is cut short');
  return bytes;
}

/** Keep the memory as it is now, in place of any other version's. numpy must not be in it yet. */
export async function keepSnapshot(pyodide) {
  try {
    const cache = await self.caches?.open(STORE);
    if (!cache) return;
    const bytes = pyodide.makeMemorySnapshot();
    await cache.put(KEY, new Response(bytes, { headers: { [LENGTH]: bytes.length } }));
    for (const { url } of await cache.keys()) {
      if (new URL(url).pathname !== KEY) await cache.delete(url);
    }
  } catch (problem) {
    console.info(`no snapshot: ${problem.message}`);
  }
}

export async function dropSnapshot() {
  try {
    await (await self.caches?.open(STORE))?.delete(KEY);
  } catch { /* then there is none */ }
}
