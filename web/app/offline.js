// Keeps the whole app on the device: registers the service worker and tells how far it is.

/**
 * onProgress({done, total}): bytes of this version that are on the device, while it is fetched.
 * onState(state): 'fetching', then 'ready' (ready for the hill: works with no network from here on);
 * 'waiting' when the next version is whole too: it takes over at the next cold start; 'failed' when
 * the fetch broke off (it goes on at the next visit); 'unsupported' where nothing can be kept.
 */
export async function startOffline({ onProgress = () => {}, onState = () => {} } = {}) {
  if (!navigator.serviceWorker) return onState('unsupported');
  const container = navigator.serviceWorker;
  container.addEventListener('message', ({ data }) => {
    if (data?.type === 'precache') onProgress({ done: data.done, total: data.total });
  });
  container.startMessages();
  try {
    const registration = await container.register('service-worker.js', { updateViaCache: 'none' });
    if (registration.active) onState('ready');
    if (registration.waiting) onState('waiting');
    if (registration.installing) follow(registration, onState);
    registration.addEventListener('updatefound', () => follow(registration, onState));
  } catch {
    // Offline with the app already on the device, registering fails and nothing is amiss.
    onState(container.controller ? 'ready' : 'failed');
  }
}

/** Tell what becomes of the version that is being fetched. */
function follow(registration, onState) {
  const worker = registration.installing;
  if (!worker || worker.followed) return;
  worker.followed = true;
  const first = !registration.active;
  if (first) onState('fetching');
  worker.addEventListener('statechange', () => {
    if (worker.state === 'installed' && !first) onState('waiting');
    if (worker.state === 'activated') onState('ready');
    if (worker.state === 'redundant' && first) onState('failed');
  });
}
