/** The look of the page: follows the phone, or is set. */

export const LOOKS = ['auto', 'light', 'dark', 'glare'];

const dark = matchMedia('(prefers-color-scheme: dark)');
const contrast = matchMedia('(prefers-contrast: more)');

/**
 * Keeps the page in the chosen look; on `auto` it follows the phone, also when that changes.
 * @param {ReturnType<import('./store.js').createStore>} store
 */
export function followLook(store) {
  const meta = document.querySelector('meta[name="theme-color"]');
  function apply() {
    const { look } = store.get();
    const auto = contrast.matches ? 'glare' : dark.matches ? 'dark' : 'light';
    const next = LOOKS.includes(look) && look !== 'auto' ? look : auto;
    if (document.documentElement.dataset.look === next) return;
    document.documentElement.dataset.look = next;
    meta.content = getComputedStyle(document.documentElement).getPropertyValue('--paper').trim();
  }
  dark.addEventListener('change', apply);
  contrast.addEventListener('change', apply);
  store.subscribe(apply);
  apply();
}
