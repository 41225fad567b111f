// The engine's thread: starts Python, answers questions, then lets numpy join.
//
// In:  {id, question}   question and answer are JSON texts
// Out: {id, answer} | {id, failure}   one for each question
//      {state: 'restoring'}   a start that needs no network has begun
//      {state: 'afresh'}   it failed; a plain start has begun instead
//      {state: 'ready'}   questions can be answered
//      {state: 'arrays'}  numpy has joined: an answer may now say more
//      {state: 'scalar', message}   numpy could not join: answers stay as they are
//      {state: 'failed', message}   this thread is of no more use
// A worker that is named 'plain' takes no snapshot: the one that it replaces did not end well.
import { loadPyodide } from 'pyodide';

import { bytesOf, load } from './head-start.js';
import { dropSnapshot, keepSnapshot, storedSnapshot } from './snapshot.js';

const WHEEL = '/lib/snowhold.whl';

/** From nothing: the slow way, which always works, and leaves a snapshot for the next start. */
async function plainStart() {
  const wheel = bytesOf(ENGINE.wheel);
  const pyodide = await load(loadPyodide, { _makeSnapshot: true });
  // A wheel of pure Python is a zip that Python imports from as it is.
  pyodide.FS.writeFile(WHEEL, await wheel);
  pyodide.runPython(`
    import json, sys
    sys.path.append("${WHEEL}")
    sys.modules["numpy"] = None  # not here until it has been imported whole, in a quiet moment
    import snowhold

    def answer_json(text):
        return json.dumps(snowhold.answer(json.loads(text)), allow_nan=False)
  `);
  return pyodide;
}

/** From the memory that an earlier start left here; null when there is none or it does not fit. */
async function quickStart() {
  const snapshot = await storedSnapshot();
  if (!snapshot) return null;
  self.postMessage({ state: 'restoring' });
  try {
    const pyodide = await load(loadPyodide, { _loadSnapshot: snapshot.bytes });
    pyodide.FS.writeFile(WHEEL, await bytesOf(ENGINE.wheel));
    return pyodide;
  } catch (problem) {
    console.info(`starting afresh: ${problem.message}`);
    self.postMessage({ state: 'afresh' });
    await dropSnapshot();
    return null;
  }
}

async function start() {
  if (self.name === 'plain') await dropSnapshot();
  const quick = await quickStart();
  self.startedFrom = quick ? 'snapshot' : 'nothing'; // for whoever looks with a browser's tools
  const pyodide = quick ?? await plainStart();
  return { pyodide, answerJson: pyodide.globals.get('answer_json') };
}

const started = start();
let lastAsked = 0;

self.onmessage = async ({ data: { id, question } }) => {
  lastAsked = performance.now();
  try {
    const answer = (await started).answerJson(question);
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

/** Until no question has come for a while: the steps that follow hold this thread up. */
async function quiet() {
  do await pause(100); while (performance.now() - lastAsked < 100);
}

async function loadArrays(pyodide) {
  await pyodide.loadPackage('numpy', { messageCallback() {} });
  await quiet();
  pyodide.runPython('del sys.modules["numpy"]\nimport numpy');
  self.postMessage({ state: 'arrays' });
}

started.then(async ({ pyodide }) => {
  self.postMessage({ state: 'ready' });
  await quiet();
  if (self.startedFrom === 'nothing') await keepSnapshot(pyodide);
  await loadArrays(pyodide).catch((problem) => {
    self.postMessage({ state: 'scalar', message: String(problem?.message ?? problem) });
  });
}, fail);
