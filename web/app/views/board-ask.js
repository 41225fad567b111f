/** The questions of the Board view, put when what they rest on has changed. */

import { boardOf, boardQuestion, boardsQuestion } from './board-state.js';

/**
 * Errors of a comparison that are the open board's, under the names of its own fields; one of
 * another board as that of `compared`.
 * @param {{field: string, problem: string, allowed: string}[]} errors
 */
function ofOpenBoard(errors) {
  const own = errors.map((error) => ({ ...error, field: error.field.replace(/^boards\[0\]\./, '') }))
    .map((error) => (error.field.startsWith('boards[') ? { ...error, field: 'compared' } : error));
  return own.filter(({ field }, i) => own.findIndex((other) => other.field === field) === i);
}

/**
 * @param {object} given
 * @param {ReturnType<import('../store.js').createStore>} given.store
 * @param {any} given.engine
 * @param {() => boolean} given.comparing whether all boards are wanted
 * @param {() => void} given.onChange errors or what is settled have changed
 */
export function createBoardAsker({ store, engine, comparing, onChange }) {
  let asked = '';
  let errors = [];
  /** Whether what is shown is the answer to what is set. */
  let settled = false;

  async function ask(mine) {
    const state = store.get();
    const { usual_speed_mps: own } = boardOf(state).riding;
    const questions = { boards: boardsQuestion(state, comparing()) };
    try {
      if (!engine.arrays) {
        // Nothing can be told yet but what is wrong with the entries.
        const refused = await engine.ask('board', boardQuestion(state, own));
        if (refused?.error && mine === asked) failed(refused.error);
        return;
      }
      const boards = await engine.ask('boards', questions.boards);
      if (boards === null || mine !== asked) return;
      if (boards.error) return failed(ofOpenBoard(boards.error));
      const speedMps = own ?? boards.usual_speed_mps.mean;
      questions.board = boardQuestion(state, speedMps);
      const board = await engine.ask('board', questions.board);
      if (board === null || mine !== asked) return;
      if (board.error) return failed(board.error);
      errors = [];
      settled = true;
      store.set({ answers: { board: { answer: board, boards, questions, all: comparing() } } });
    } catch {
      // The engine has failed; main.js hears of it and has the view updated.
    }
  }

  function failed(found) {
    // What needs numpy before numpy is there is no fault of what is typed.
    errors = found.filter(({ field }) => field !== 'ask');
    onChange();
  }

  return {
    /** Puts the questions anew where they differ from those put last. */
    update(state) {
      const wanted = JSON.stringify([engine.arrays, boardsQuestion(state, comparing()), boardQuestion(state, null)]);
      if (wanted === asked) return;
      asked = wanted;
      settled = false;
      ask(wanted);
    },
    errors: () => errors,
    settled: () => settled,
  };
}
