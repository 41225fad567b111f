// Pyodide asks for its files one after the other, and compiles when it has them all. Here they set
// out together, before Pyodide is even asked to start, and the compiling goes on beside the rest.

const folder = new URL(`../${ENGINE.folder}/`, import.meta.url).href;
const askHost = self.fetch.bind(self);
const { instantiateStreaming } = WebAssembly;

/** The bytes of a file of the runtime. */
export async function bytesOf(name) {
  const response = await askHost(folder + name);
  if (!response.ok) throw new Error(`${name}: ${response.status} ${response.statusText}`);
  return new Uint8Array(await response.arrayBuffer());
}

let giveUp; // rejects the load under way

/** Start what every start needs. */
function setOut() {
  const compiled = WebAssembly.compileStreaming(askHost(`${folder}pyodide.asm.wasm`));
  compiled.catch(() => {}); // it is told where it is waited for
  const coming = new Map([[`${folder}pyodide.asm.wasm`, compiled]]);
  for (const name of ['pyodide-lock.json', 'python_stdlib.zip']) {
    coming.set(folder + name, askHost(folder + name));
    coming.get(folder + name).catch(() => {}); // Pyodide hears of it when it asks
  }
  self.fetch = (input, options) => {
    const early = coming.get(String(input));
    coming.delete(String(input)); // a body is read once; a second start fetches anew
    return early ?? askHost(input, options);
  };
  WebAssembly.instantiateStreaming = async (source, imports) => {
    try {
      if (source !== compiled) return await instantiateStreaming(source, imports);
      const module = await compiled;
      return { module, instance: await WebAssembly.instantiate(module, imports) };
    } catch (problem) {
      giveUp(problem); // Pyodide itself would wait for ever
      throw problem;
    }
  };
  return import(`${folder}pyodide.asm.js`);
}

const script = setOut();
script.catch(() => {});

/** loadPyodide(options), with the head start. */
export async function load(loadPyodide, options) {
  await script;
  const failure = new Promise((_, reject) => { giveUp = reject; });
  return Promise.race([loadPyodide({ indexURL: folder, ...options }), failure]);
}
