// The page's side of the engine: starts the worker, puts questions, drops what a newer one overtook.

// What takes longer than this has hung. A start from the network may take as long as it takes.
const PATIENCE_MS = 30_000;

/**
 * Start the engine.
 *
 * onState(state, message) hears 'starting', 'ready' or 'failed'; onArrays() hears once that numpy
 * has joined, when an answer may say more than before. Both states are also on the document:
 * <html data-engine="…" data-arrays="ready">.
 *
 * Gives {ask(channel, question), stop()}. ask promises the answer; it resolves to null when a newer
 * question on the same channel overtook it, and rejects when the engine could not answer.
 */
export function startEngine({ onState = () => {}, onArrays = () => {} } = {}) {
  const channels = new Map(); // name → {asked, waiting}: one question in the worker, one behind it
  let worker;
  let restarts = 1;
  let startWatch;
  let state;
  let serial = 0;

  function tell(next, message) {
    if (state === next) return;
    state = next;
    document.documentElement.dataset.engine = next;
    onState(next, message);
  }

  function start(name) {
    const early = globalThis.snowholdEarly; // early.js has started one already
    delete globalThis.snowholdEarly;
    worker = early?.worker
      ?? new Worker(new URL(`../${WORKER_URL}`, import.meta.url), { type: 'module', name });
    worker.onmessage = ({ data }) => ('state' in data ? heard[data.state]?.(data) : settle(data));
    worker.onerror = (event) => lost(event.message || 'the worker could not be started');
    worker.onmessageerror = () => lost('an answer could not be read');
    for (const data of early?.heard ?? []) worker.onmessage({ data });
  }

  const heard = {
    // The worker needs no network for this start.
    restoring() { startWatch = setTimeout(lost, PATIENCE_MS, 'the engine did not start'); },
    afresh: () => clearTimeout(startWatch),
    ready() {
      clearTimeout(startWatch);
      tell('ready');
      for (const { asked } of channels.values()) watch(asked);
    },
    arrays() {
      document.documentElement.dataset.arrays = 'ready';
      onArrays();
    },
    failed: ({ message }) => lost(message),
  };

  /** The worker is gone: start another one, once, and put the newest questions again. */
  function lost(message) {
    worker.terminate();
    clearTimeout(startWatch);
    delete document.documentElement.dataset.arrays;
    for (const channel of channels.values()) clearTimeout(channel.asked?.timer);
    if (restarts-- > 0) {
      tell('starting', message);
      start('plain'); // what the dead one started from may be what killed it
      for (const channel of channels.values()) {
        if (channel.waiting) channel.asked?.resolve(null);
        const next = channel.waiting ?? channel.asked;
        channel.waiting = undefined;
        channel.asked = undefined;
        if (next) send(channel, next);
      }
      return;
    }
    for (const { asked, waiting } of channels.values()) {
      asked?.reject(new Error(message));
      waiting?.reject(new Error(message));
    }
    channels.clear();
    tell('failed', message);
  }

  function send(channel, asked) {
    channel.asked = asked;
    if (state === 'ready') watch(asked);
    worker.postMessage({ id: asked.id, question: asked.question });
  }

  function watch(asked) {
    if (asked) asked.timer = setTimeout(lost, PATIENCE_MS, 'a question took too long');
  }

  function settle({ id, answer, failure }) {
    for (const channel of channels.values()) {
      const { asked, waiting } = channel;
      if (asked?.id !== id) continue;
      clearTimeout(asked.timer);
      channel.asked = undefined;
      channel.waiting = undefined;
      if (waiting) {
        asked.resolve(null);
        send(channel, waiting);
      } else if (failure === undefined) asked.resolve(JSON.parse(answer));
      else asked.reject(new Error(failure));
      return;
    }
  }

  function ask(name, question) {
    if (state === 'failed') return Promise.reject(new Error('the engine has failed'));
    if (!channels.has(name)) channels.set(name, {});
    const channel = channels.get(name);
    const { promise, ...asked } = withResolvers();
    Object.assign(asked, { id: ++serial, question: JSON.stringify(question) });
    if (channel.asked) {
      channel.waiting?.resolve(null);
      channel.waiting = asked;
    } else send(channel, asked);
    return promise;
  }

  function stop() {
    restarts = 0;
    lost('the engine was stopped');
  }

  tell('starting');
  start('engine');
  return { ask, stop };
}

/** What Promise.withResolvers gives, for browsers that lack it. */
function withResolvers() {
  const made = {};
  made.promise = new Promise((resolve, reject) => Object.assign(made, { resolve, reject }));
  return made;
}
