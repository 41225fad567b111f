/**
 * The page's state: one plain object, changed only through `set`, kept in IndexedDB. Everything
 * that is shown follows from it.
 */

import { get as read, set as write } from 'idb-keyval';

const KEY = 'snowhold-state';
/** Counts up when a kept state no longer fits. */
const VERSION = 1;
/** Changes of one thing that follow each other faster than this are undone together, ms. */
const TOGETHER_MS = 1000;
const UNDO_DEPTH = 100;
/** A burst of changes is written once, after this pause, ms. */
const WRITE_AFTER_MS = 150;

/**
 * @typedef {object} State
 * @property {Record<string, number|string|null>} inputs values by question key, in the engine's
 *   units; a typed text that is no number stands here as it was typed
 * @property {import('./units.js').Units} units
 * @property {string} look 'auto', 'light', 'dark' or 'glare'
 * @property {string} view name of the view that is open
 * @property {{spread: Record<string, any>, run: Record<string, any>}} turn how rough the turn's inputs
 *   are (what is not here is as assumed), and the run of turns
 * @property {Record<string, any>} board what the Board view holds: plain JSON, its own shape
 * @property {Record<string, any>} pitch what the Pitch view holds, likewise
 * @property {Record<string, any[]>} kit saved riders, boards and pitches
 * @property {Record<string, {question: object, answer: object}>} answers last good answer by view
 */

/** Parts of the state that a patch merges into instead of replacing. */
const MERGED = ['inputs', 'units', 'answers', 'turn', 'board', 'pitch', 'kit'];
/** Parts of the state that undo brings back. */
const UNDONE = ['inputs', 'units', 'look', 'turn', 'board', 'pitch', 'kit'];

/** @param {State} initial the state of a first visit; also says which inputs there are */
export function createStore(initial) {
  let state = initial;
  /** @type {{what: string, open: boolean, at: number, before: Partial<State>}[]} */
  const history = [];
  const listeners = new Set();
  let timer = 0;

  function changed() {
    clearTimeout(timer);
    timer = setTimeout(flush, WRITE_AFTER_MS);
    for (const listener of listeners) listener(state);
  }

  async function flush() {
    if (!timer) return;
    clearTimeout(timer);
    timer = 0;
    try {
      await write(KEY, { version: VERSION, state });
    } catch {
      // Storage is full or denied: the app works on, it only forgets when closed.
    }
  }

  function remember(what, alone) {
    const last = history.at(-1);
    const now = alone ? -Infinity : performance.now();
    if (!alone && last?.what === what && (last.open || now - last.at < TOGETHER_MS)) {
      last.at = now;
      last.open = true;
      return;
    }
    const before = Object.fromEntries(UNDONE.map((key) => [key, state[key]]));
    history.push({ what, open: !alone, at: now, before });
    if (history.length > UNDO_DEPTH) history.shift();
  }

  return {
    get: () => state,

    /**
     * Changes the state: the parts of MERGED are merged, other keys replaced.
     * @param {Partial<State>} patch
     * @param {{undo?: string, alone?: boolean}} [options] `undo`: name of what is changed; changes
     *   of the same thing in one go are undone together, one that is `alone` is not
     */
    set(patch, { undo, alone = false } = {}) {
      if (undo) remember(undo, alone);
      const next = { ...state, ...patch };
      for (const key of MERGED) {
        if (key in patch) next[key] = { ...state[key], ...patch[key] };
      }
      state = next;
      changed();
    },

    /** Ends a change made in one go, such as the drag of a slider. */
    seal() {
      const last = history.at(-1);
      if (last) last.open = false;
    },

    /** Name of what `undo` would take back, or null. */
    undoable: () => history.at(-1)?.what ?? null,

    undo() {
      const last = history.pop();
      if (!last) return;
      state = { ...state, ...last.before };
      changed();
    },

    /** @param {(state: State) => void} listener called after every change */
    subscribe(listener) {
      listeners.add(listener);
    },

    /** Brings back what was kept, as far as it fits. */
    async load() {
      try {
        const kept = await read(KEY);
        if (kept?.version === VERSION) state = fitted(initial, kept.state);
      } catch {
        // No storage to read: a first visit.
      }
    },

    /** Writes at once what waits to be written. */
    flush,
  };
}

/** What is kept, as far as today's state knows its keys. */
function fitted(initial, kept) {
  const fits = (value) => ['number', 'string'].includes(typeof value) || value === null;
  const known = (part, values = {}) =>
    Object.fromEntries(Object.keys(part).map((key) =>
      [key, key in values && fits(values[key]) ? values[key] : part[key]]));
  return {
    ...initial,
    inputs: known(initial.inputs, kept.inputs),
    units: known(initial.units, kept.units),
    look: fits(kept.look) ? kept.look : initial.look,
    view: fits(kept.view) ? kept.view : initial.view,
    turn: { ...initial.turn, ...kept.turn },
    board: { ...initial.board, ...kept.board },
    pitch: { ...initial.pitch, ...kept.pitch },
    kit: { ...initial.kit, ...kept.kit },
    answers: { ...initial.answers, ...kept.answers },
  };
}
