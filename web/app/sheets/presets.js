/** Speeds that people ride, as published: a tap sets one; where they come from is a tap away. */

import { el, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { t } from '../text.js';
import { show } from '../units.js';

const WHO = ['beginner', 'intermediate', 'advanced'];

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createPresets(store) {
  const buttons = WHO.map((who) => {
    const mean = createFigure('speed');
    const source = el('li');
    let speed = null;
    const node = el('button', { type: 'button', class: 'preset', 'data-preset': who, on: { click: set } },
      el('span', { class: 'preset-who', text: t(`speeds.${who}`) }), mean.node);
    function set() {
      if (!speed) return;
      store.set({ inputs: { speed_mps: speed.mean_mps } }, { undo: 'speed_mps', alone: true });
    }
    function update(reference, units) {
      const index = reference.speeds.findIndex((one) => one.who === who);
      speed = reference.speeds[index];
      mean.update(reference, `speeds.${index}.mean_mps`, units);
      setText(source, t('speeds.source', {
        who: t(`speeds.${who}`), speed: show('speedWindow', speed.mean_mps, units),
        spread: show('speedWindow', speed.spread_mps, units), source: speed.source,
      }));
    }
    return { node, source, update };
  });
  const sources = el('details', { class: 'sources' }, el('summary', { text: t('window.presets.source') }),
    el('ul', {}, ...buttons.map(({ source }) => source)));
  const node = el('div', { class: 'presets', 'data-ask': 'reference', hidden: true }, el('h3', { text: t('window.presets') }),
    el('div', { class: 'preset-row' }, ...buttons.map((button) => button.node)), sources);
  return {
    node,
    update(reference, units) {
      node.hidden = !reference?.speeds;
      if (!node.hidden) for (const button of buttons) button.update(reference, units);
    },
  };
}
