/** Small helpers to build nodes once and to change only what changed afterwards. */

const SVG = 'http://www.w3.org/2000/svg';

/**
 * An HTML element. `text` sets its text, `on` its listeners, every other key an attribute.
 * @param {string} tag
 * @param {Record<string, any>} [options]
 * @param {...(Node|string|null)} children
 * @returns {any}
 */
export function el(tag, options = {}, ...children) {
  return filled(document.createElement(tag), options, children);
}

/** The same for SVG. @returns {any} */
export function svg(tag, options = {}, ...children) {
  return filled(document.createElementNS(SVG, tag), options, children);
}

function filled(node, { text, on, ...attributes }, children) {
  for (const [name, value] of Object.entries(attributes)) setAttribute(node, name, value);
  for (const [type, listener] of Object.entries(on ?? {})) node.addEventListener(type, listener);
  if (text !== undefined) node.textContent = text;
  node.append(...children.filter((child) => child !== null));
  return node;
}

/**
 * Sets an attribute only where it differs, so that an unchanged picture costs no repaint.
 * `null`, `undefined` and `false` remove it, `true` sets it empty.
 */
export function setAttribute(node, name, value) {
  if (value === null || value === undefined || value === false) {
    if (node.hasAttribute(name)) node.removeAttribute(name);
    return;
  }
  const text = value === true ? '' : String(value);
  if (node.getAttribute(name) !== text) node.setAttribute(name, text);
}

/** Sets several attributes. */
export function setAttributes(node, attributes) {
  for (const [name, value] of Object.entries(attributes)) setAttribute(node, name, value);
}

/** Sets the text only where it differs. */
export function setText(node, text) {
  if (node.textContent !== text) node.textContent = text;
}

/** Shows or hides a node, keeping it out of the accessibility tree too. */
export function setShown(node, shown) {
  // As an attribute: SVG nodes have no such property.
  setAttribute(node, 'hidden', !shown);
}

/**
 * Keeps a drag on a node. On a busy phone a tap may be over before it is heard of; then there is
 * nothing to keep, and the browser would throw.
 * @param {Element} node
 * @param {PointerEvent} event
 */
export function keepPointer(node, { pointerId }) {
  try {
    node.setPointerCapture(pointerId);
  } catch { /* let go already: a tap */ }
}
