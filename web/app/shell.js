/** What is around every view: caution, settings, the way between views, ready for the hill. */

import { el, setAttribute, setShown, setText } from './dom.js';
import { followLook } from './look.js';
import { startOffline } from './offline.js';
import { drawWarningSign } from './pictures/warning-sign.js';
import { createCautionSheet } from './sheets/caution.js';
import { createSettingsSheet } from './sheets/settings.js';
import { formatNumber, language, t } from './text.js';
import { createBoardView } from './views/board.js';
import { createPitchView } from './views/pitch.js';
import { followPitchLinks } from './views/pitch-link.js';
import { createTurnView } from './views/turn.js';

/** The views by name, in the order of the navigation. The contract of a view: views/turn.js. */
const VIEWS = { turn: createTurnView, board: createBoardView, pitch: createPitchView };

/** @param {{store: ReturnType<import('./store.js').createStore>, engine: any}} context */
export function createShell(context) {
  const { store } = context;
  document.documentElement.lang = language;
  followLook(store);
  const caution = createCautionSheet();
  const settings = createSettingsSheet(store);
  const header = createHeader(caution, settings);
  const main = document.querySelector('main');
  const hosts = Object.fromEntries(Object.keys(VIEWS).map((name) =>
    [name, el('section', { class: `view ${name}-view`, 'aria-label': t(`view.${name}`), hidden: true })]));
  main.append(...Object.values(hosts));
  /** A view is made when it is first shown: what nobody looks at takes no time to start. */
  const views = {};
  const viewOf = (name) => (views[name] ??= VIEWS[name](hosts[name], context));
  const nav = createNav(Object.keys(VIEWS), (view) => store.set({ view }));
  document.querySelector('header').after(nav.node);
  const hill = createHill(settings);
  main.append(hill);

  let current = null;
  function update() {
    const state = store.get();
    const view = Object.hasOwn(VIEWS, state.view) ? state.view : 'turn';
    if (view !== current) {
      if (current) viewOf(current).hide();
      viewOf(view).show();
      nav.update(view);
      current = view;
    }
    viewOf(view).update(state);
    header.update(state.answers[view]?.answer.cautions ?? []);
    settings.update(state);
  }
  store.subscribe(update);
  update();
  followPitchLinks(store);
  return { update };
}

/** The caution, always in view; from a slope that can slide on, with the warning sign. */
function createHeader(caution, settings) {
  const text = el('span', { class: 'caution-text', text: t('caution.short') });
  const warning = el('span', { class: 'caution-warning', hidden: true }, drawWarningSign(), el('span', { text: t('caution.avalanche') }));
  const node = document.querySelector('header');
  node.append(
    el('button', { type: 'button', class: 'caution', 'aria-haspopup': 'dialog', on: { click: caution.open } }, warning, text),
    el('button', { type: 'button', class: 'settings', 'aria-haspopup': 'dialog', text: t('sheet.settings'), on: { click: settings.open } }));
  return {
    /** @param {string[]} codes the engine's cautions */
    update(codes) {
      const steep = codes.includes('avalanche');
      setAttribute(node, 'data-warning', steep);
      setShown(warning, steep);
    },
  };
}

/** Buttons to the views; hidden while there is one view alone. */
function createNav(names, onChoose) {
  const buttons = names.map((name) => el('button', { type: 'button', class: 'nav-button', text: t(`view.${name}`), on: { click: () => onChoose(name) } }));
  const node = el('nav', { class: 'nav', 'aria-label': t('view.nav'), hidden: names.length < 2 }, ...buttons);
  return {
    node,
    update(current) {
      names.forEach((name, i) => setAttribute(buttons[i], 'aria-current', name === current ? 'page' : null));
    },
  };
}

/** How far the app is on the phone. */
function createHill(settings) {
  const text = el('p', { class: 'hill-text', role: 'status' });
  const bar = el('span', { class: 'hill-bar', hidden: true, 'aria-hidden': 'true' });
  document.querySelector('header').append(bar);
  const say = (key, values) => {
    setText(text, t(key, values));
    settings.sayReady(t(key, values));
  };
  startOffline({
    onProgress({ done, total }) {
      const share = total ? done / total : 0;
      // Screen readers hear of every tenth, the eye sees every step.
      say('offline.fetching', { percent: `${formatNumber(Math.floor(share * 10) * 10)}\u202f%` });
      setShown(bar, true);
      bar.style.transform = `scaleX(${share.toFixed(3)})`;
    },
    onState(state) {
      if (state !== 'fetching') setShown(bar, false);
      if (state === 'fetching') say('offline.fetching', { percent: `0\u202f%` });
      else say(`offline.${state}`);
    },
  });
  return el('footer', { class: 'hill' }, text);
}
