/**
 * The type, fetched like any other file of the app: the page's policy needs no exception for
 * fonts, and the first picture is drawn in them, so that nothing jumps.
 */

import condensed600 from '../styles/fonts/barlow-condensed-600.woff2';
import semi500 from '../styles/fonts/barlow-semi-condensed-500.woff2';
import semi600 from '../styles/fonts/barlow-semi-condensed-600.woff2';

const FACES = [
  ['Barlow Condensed', '600', condensed600],
  ['Barlow Semi Condensed', '500', semi500],
  ['Barlow Semi Condensed', '600', semi600],
];

/** Adds the faces; a face that does not come is left to the system's own. */
export async function loadFonts() {
  await Promise.allSettled(FACES.map(async ([family, weight, path]) => {
    const response = await fetch(new URL(path, import.meta.url));
    const face = new FontFace(family, await response.arrayBuffer(), { weight });
    document.fonts.add(await face.load());
  }));
}
