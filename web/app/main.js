/** Puts the page together: state, engine, views. Input changes the state, the state is shown. */

import { startEngine } from './engine.js';
import { loadFonts } from './fonts.js';
import { createShell } from './shell.js';
import { createStore } from './store.js';
import { DEFAULT_UNITS } from './units.js';

/** The page is drawn after this, ms, with or without its type and what was kept. */
const PATIENCE_MS = 600;

const store = createStore({
  inputs: {
    pitch_deg: 15, speed_mps: 20 / 3.6, sidecut_radius_m: 8, snow: 'P', rider_mass_kg: 80,
    angulation_deg: 5, max_load_g: 2, effective_edge_m: 1.2, line_radius_m: null, drag_angle_deg: null,
    from_phase_deg: 0,
  },
  units: DEFAULT_UNITS,
  look: 'auto',
  view: 'turn',
  turn: { spread: {}, run: {} },
  board: {},
  pitch: {},
  kit: {},
  answers: {},
});

/** The engine, how it stands, and whether numpy has joined it, when an answer may say more. */
const engine = { state: 'starting', arrays: false, ask: null };
let shell = null;
engine.ask = startEngine({
  onState(state) {
    engine.state = state;
    shell?.update();
  },
  onArrays() {
    engine.arrays = true;
    shell?.update();
  },
}).ask;

await Promise.race([
  Promise.all([store.load(), loadFonts()]),
  new Promise((resolve) => { setTimeout(resolve, PATIENCE_MS); }),
]);
shell = createShell({ store, engine });
addEventListener('pagehide', store.flush);
document.addEventListener('visibilitychange', () => { if (document.hidden) store.flush(); });
