/** The rest of a leg: how its steepness is given, its snow, and its removal. */

import { createChoice } from '../controls/choice.js';
import { el, setShown, setText } from '../dom.js';
import { t } from '../text.js';
import { GIVEN, legPatch, pitchOf, selectedLeg } from '../views/pitch-state.js';
import { createSheet } from './sheet.js';
import { SNOWS } from './snow.js';

/** Stands for the snow of the whole slope. */
const SAME = 'same';

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createPitchLegSheet(store) {
  let answer = null;
  const change = (values) => {
    const pitch = pitchOf(store.get());
    store.set(legPatch(pitch, selectedLeg(pitch).index, values), { undo: 'pitch-legs' });
    store.seal();
  };
  const by = createChoice({
    name: 'leg-by', legend: t('pitch.leg.by'),
    options: Object.keys(GIVEN).map((value) => ({ value, label: t(`pitch.leg.by.${value}`) })),
    onChoose: (key) => change({ by: key, value: figureOf(key) }),
  });
  const snow = createChoice({
    name: 'leg-snow', legend: t('pitch.leg.snow'),
    options: [{ value: SAME, label: t('pitch.leg.snow.same', { snow: '' }) },
      ...SNOWS.map((value) => ({ value, label: t(`snow.${value}`), detail: t(`snow.${value}.short`) }))],
    onChoose: (value) => change({ snow: value === SAME ? null : value }),
  });
  const same = snow.node.querySelector('.option-label');
  const remove = el('button', { type: 'button', class: 'plain-button', text: t('pitch.leg.remove'), on: { click: removed } });
  const sheet = createSheet('pitch-leg', null, by.node, snow.node, remove);

  /** The leg's steepness given another way: the engine has it in all three. */
  function figureOf(key) {
    const { index } = selectedLeg(pitchOf(store.get()));
    const leg = answer?.legs[index];
    return leg ? Number(leg[key].toFixed(3)) : '';
  }

  function removed() {
    const pitch = pitchOf(store.get());
    const { index } = selectedLeg(pitch);
    const legs = pitch.legs.filter((_, i) => i !== index);
    store.set({ pitch: { legs, selected: Math.max(0, index - 1), demo: false, notice: null } }, { undo: 'pitch-legs' });
    store.seal();
    sheet.dialog.close();
  }

  return {
    ...sheet,
    /** @param {any} current the answer to what is set, or the last one */
    update(state, current) {
      answer = current ?? null;
      const pitch = pitchOf(state);
      const { index, leg } = selectedLeg(pitch);
      setText(sheet.dialog.querySelector('h2'), t('pitch.leg', { leg: index + 1 }));
      by.update(leg.by);
      snow.update(leg.snow ?? SAME);
      setText(same, t('pitch.leg.snow.same', { snow: t(`snow.${state.inputs.snow}`) }));
      setShown(remove, pitch.legs.length > 1);
    },
  };
}
