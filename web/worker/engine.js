// The engine's thread: starts Python, answers questions, then lets numpy join.
//
// In:  {id, question}   question and answer are JSON texts
// Out: {id, answer} | {id, failure}   one for each question
//      {state: 'ready'}   questions can be answered
//      {state: 'arrays'}  numpy has joined: an answer may now say more
//      {state: 'failed', message}   this thread is of no more use
import { loadPyodide } from 'pyodide';

const folder = new URL(`../${ENGINE.folder}/`, import.meta.url).href;

const fetched = async (name) => {
  const response = await fetch(folder + name);
  if (!response.ok) throw new Error(`${name}: ${response.status} ${response.statusText}`);
  return response;
};

async function startPython() {
  const wheel = fetched(ENGINE.wheel).then((response) => response.arrayBuffer());
  const pyodide = await loadPyodide({ indexURL: folder });
  // A wheel of pure Python is a zip that Python imports from as it is.
  pyodide.FS.writeFile('/lib/snowhold.whl', new Uint8Array(await wheel));
  pyodide.runPython(`
    import json, sys
    sys.path.append("/lib/snowhold.whl")
    import snowhold

    def answer_json(text):
        return json.dumps(snowhold.answer(json.loads(text)), allow_nan=False)
  `);
  return pyodide;
}

const python = startPython();
const answering = python.then((pyodide) => pyodide.globals.get('answer_json'));
let lastAsked = 0;

self.onmessage = async ({ data: { id, question } }) => {
  lastAsked = performance.now();
  try {
    const answer = (await answering)(question);
    self.postMessage({ id, answer });
  } catch (problem) {
    // A Python exception spoils one question; anything else means that the interpreter is gone.
    self.postMessage({ id, failure: String(problem.message ?? problem) });
    if (problem.name !== 'PythonError') fail(problem);
  }
};

function fail(problem) {
  self.postMessage({ state: 'failed', message: String(problem?.message ?? problem) });
}

const pause = (ms) => new Promise((resolve) => setTimeout(resolve, ms));

/** Load numpy when no question has come for a while: its import holds this thread up. */
async function loadArrays(pyodide) {
  await pyodide.loadPackage('numpy', { messageCallback() {}, checkIntegrity: false });
  do await pause(100); while (performance.now() - lastAsked < 100);
  pyodide.runPython('import numpy');
  self.postMessage({ state: 'arrays' });
}

python.then(async (pyodide) => {
  self.postMessage({ state: 'ready' });
  await pause(0);
  await loadArrays(pyodide).catch((problem) => {
    self.postMessage({ state: 'scalar', message: String(problem?.message ?? problem) });
  });
}, fail);
