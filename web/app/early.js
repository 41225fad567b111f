// Starts the engine before the page's own scripts are there; engine.js takes it over.
const worker = new Worker(WORKER_URL, { type: 'module', name: 'engine' });
const heard = [];
worker.onmessage = ({ data }) => heard.push(data);
worker.onerror = ({ message }) => heard.push({ state: 'failed', message });
globalThis.snowholdEarly = { worker, heard };
