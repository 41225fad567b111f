/** A board taken to the Turn view: its sidecut, its edge, the angle at which the boot drags. */

import { boardOf, boardQuestion } from './board-state.js';

/** @param {{store: ReturnType<import('../store.js').createStore>, engine: any}} context */
export function createRide({ store, engine }) {
  /** @param {import('../kit.js').Entry|null} entry a kept board; null: the open one */
  return async function ride(entry) {
    const state = store.get();
    const board = entry ? entry.values : boardOf(state).board;
    try {
      const answer = await engine.ask('board-ride', boardQuestion(state, null, board));
      if (answer === null || answer.error) return;
      const angles = Object.values(answer.drag_angle_deg ?? {}).filter((angle) => angle !== null);
      const inputs = {
        sidecut_radius_m: answer.sidecut_radius_m, effective_edge_m: board.effective_edge_m,
        drag_angle_deg: angles.length ? Math.min(...angles) : null, waist_m: board.waist_m,
      };
      // Only what Turn has an input for.
      const known = Object.fromEntries(Object.entries(inputs).filter(([key]) => key in store.get().inputs));
      for (const dialog of document.querySelectorAll('dialog[open]')) dialog.close();
      store.set({ inputs: known, view: 'turn' }, { undo: 'ride' });
      store.seal();
    } catch {
      // The engine has failed; main.js hears of it.
    }
  };
}
