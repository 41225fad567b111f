/**
 * A pitch as a link: the whole state after the `#`, so that no server sees it. What comes in is
 * not trusted: keys, kinds of values and lengths are checked here, ranges by the engine.
 */

import { SNOWS } from '../sheets/snow.js';
import { GIVEN, MOST_LEGS, OWN, pitchOf, SHARED, START } from './pitch-state.js';

const MARK = '#pitch=';
/** Counts up when an older link no longer fits. */
const VERSION = 1;
/** A link of ten legs has about 900 characters. */
const LONGEST = 4000;
export const LONGEST_NAME = 60;
/** Beyond every range of the engine. */
const LARGEST = 1e6;

/** Shared inputs that may be null. */
const NULLABLE = [...OWN, 'drag_angle_deg'].filter((key) => key !== 'speed_mps' && key !== 'fall_at_m');

/** The address that opens this pitch. */
export function pitchLink(state) {
  const pitch = pitchOf(state);
  const content = {
    v: VERSION,
    name: pitch.name,
    demo: pitch.demo,
    legs: pitch.legs.map(({ by, value, length_m, snow }) => [by, value, length_m, snow]),
    own: OWN.map((key) => pitch[key]),
    shared: SHARED.map((key) => state.inputs[key]),
  };
  const bytes = new TextEncoder().encode(JSON.stringify(content));
  const base64 = btoa(String.fromCharCode(...bytes));
  const safe = base64.replaceAll('+', '-').replaceAll('/', '_').replace(/=+$/, '');
  return `${location.origin}${location.pathname}${MARK}${safe}`;
}

/**
 * What a link's fragment holds, as a patch of the state; null: it is not a pitch that this
 * version can read.
 * @param {string} fragment
 */
export function readPitchLink(fragment) {
  try {
    const coded = fragment.slice(MARK.length);
    if (coded.length > LONGEST || !/^[\w-]+$/.test(coded)) return null;
    const bytes = Uint8Array.from(atob(coded.replaceAll('-', '+').replaceAll('_', '/')), (one) => one.charCodeAt(0));
    return patchOf(JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes)));
  } catch {
    return null;
  }
}

function patchOf(content) {
  const known = ['v', 'name', 'demo', 'legs', 'own', 'shared'];
  must(isRecord(content) && Object.keys(content).every((key) => known.includes(key)));
  const { v, name, demo, legs, own, shared } = content;
  must(v === VERSION && typeof demo === 'boolean');
  must(typeof name === 'string' && name.length <= LONGEST_NAME && !/\p{C}/u.test(name));
  must(isList(legs) && legs.length >= 1 && legs.length <= MOST_LEGS);
  must(isList(own) && own.length === OWN.length && isList(shared) && shared.length === SHARED.length);
  const pitch = { ...START, name, demo, notice: 'pitch.notice.opened', legs: legs.map(legOf) };
  OWN.forEach((key, i) => { pitch[key] = numberOf(key, own[i]); });
  const inputs = {};
  SHARED.forEach((key, i) => {
    if (key === 'snow') must(SNOWS.includes(shared[i]));
    inputs[key] = key === 'snow' ? shared[i] : numberOf(key, shared[i]);
  });
  return { view: 'pitch', pitch, inputs };
}

function legOf(leg) {
  must(isList(leg) && leg.length === 4);
  const [by, value, length_m, snow] = leg;
  must(typeof by === 'string' && Object.hasOwn(GIVEN, by) && (snow === null || SNOWS.includes(snow)));
  return { by, value: numberOf(by, value), length_m: numberOf('length_m', length_m), snow };
}

function numberOf(key, value) {
  if (value === null && NULLABLE.includes(key)) return null;
  must(typeof value === 'number' && Math.abs(value) <= LARGEST);
  return value;
}

const isList = Array.isArray;
const isRecord = (value) => typeof value === 'object' && value !== null && !isList(value);

function must(holds) {
  if (!holds) throw new TypeError('not a pitch link');
}

/**
 * Opens the pitch of the page's address, now and whenever it changes to another.
 * @param {ReturnType<import('../store.js').createStore>} store
 */
export function followPitchLinks(store) {
  function open() {
    if (!location.hash.startsWith(MARK)) return;
    const patch = readPitchLink(location.hash);
    // Read once: a later visit finds what was changed since.
    history.replaceState(null, '', location.pathname + location.search);
    if (patch) {
      store.set(patch, { undo: 'pitch-link' });
      store.seal();
    } else {
      store.set({ view: 'pitch', pitch: { notice: 'pitch.notice.refused' } });
    }
  }
  addEventListener('hashchange', open);
  open();
}
