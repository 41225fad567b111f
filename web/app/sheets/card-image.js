/** The card as a picture file: drawn on a canvas from its text and from the drawing on the page. */

const WIDTH = 1080;
const EDGE = 60;
const BODY = '"Barlow Semi Condensed", "Roboto Condensed", "Arial Narrow", sans-serif';
const HEAD = '"Barlow Condensed", "Arial Narrow", sans-serif';

/**
 * @param {ReturnType<import('../views/pitch-card.js').cardContent>} content
 * @param {{words: string, numbers: string, inputs: string, sources: string, demo: string}} titles
 * @param {SVGSVGElement} drawing the drawn slope, as it stands on the page
 * @returns {Promise<Blob|null>}
 */
export function cardImage(content, titles, drawing) {
  const canvas = document.createElement('canvas');
  canvas.width = WIDTH;
  canvas.height = 10;
  // Once to measure, once to draw.
  canvas.height = Math.ceil(paint(canvas.getContext('2d'), content, titles, drawing));
  const pen = canvas.getContext('2d');
  pen.fillStyle = '#fff';
  pen.fillRect(0, 0, canvas.width, canvas.height);
  paint(pen, content, titles, drawing);
  return new Promise((resolve) => { canvas.toBlob(resolve, 'image/png'); });
}

/** Gives the height that it took. */
function paint(pen, content, titles, drawing) {
  let y = EDGE;
  const wide = WIDTH - 2 * EDGE;
  pen.fillStyle = '#000';
  pen.textBaseline = 'alphabetic';
  function text(line, size, { weight = 500, family = BODY, x = EDGE, within = wide, after = 0.35 } = {}) {
    pen.font = `${weight} ${size}px ${family}`;
    let row = '';
    const flush = () => {
      y += size * 1.02;
      pen.fillText(row, x, y);
      y += size * 0.2;
    };
    for (const word of line.split(' ')) {
      const next = row ? `${row} ${word}` : word;
      if (row && pen.measureText(next).width > within) {
        flush();
        row = word;
      } else row = next;
    }
    flush();
    y += size * after;
  }
  const title = (line) => {
    y += 14;
    pen.fillRect(EDGE, y, wide, 3);
    text(line, 30, { weight: 600, after: 0.1 });
  };

  text(content.name, 40, { weight: 600, after: 0.1 });
  if (content.demo) text(titles.demo, 34, { weight: 600 });
  pen.font = `600 100px ${HEAD}`;
  const size = Math.min(150, (100 * wide) / pen.measureText(content.headline).width);
  text(content.headline, size, { weight: 600, family: HEAD, after: 0 });
  text(content.reason, 36);
  y += paintDrawing(pen, drawing, EDGE, y, wide);
  text(content.ways, 26);
  if (content.steep) {
    paintSign(pen, EDGE, y + 8, 84);
    const top = y;
    text(content.cautions[1], 32, { weight: 600, x: EDGE + 110, within: wide - 110 });
    y = Math.max(y, top + 100);
  }
  text(content.cautions[0], 32, { weight: 600 });
  title(titles.words);
  content.sentences.forEach((line) => text(line, 36));
  title(titles.numbers);
  for (const [label, value] of content.numbers) {
    pen.font = `600 32px ${BODY}`;
    const room = pen.measureText(value).width;
    pen.fillText(value, WIDTH - EDGE - room, y + 32 * 1.02);
    text(label, 32, { within: wide - room - 30, after: 0.15 });
  }
  title(titles.inputs);
  text(content.inputs, 26);
  title(titles.sources);
  content.sources.forEach((line) => text(line, 24, { after: 0.05 }));
  text(content.date, 26);
  return y + EDGE / 2;
}

/** The drawing's paths and texts with the styles that they have on the page. */
function paintDrawing(pen, drawing, x, y, wide) {
  const [, , width, height] = drawing.getAttribute('viewBox').split(' ').map(Number);
  const scale = wide / width;
  pen.save();
  pen.translate(x, y);
  pen.scale(scale, scale);
  pen.beginPath();
  pen.rect(0, 0, width, height);
  pen.clip();
  for (const node of drawing.querySelectorAll('path, text')) {
    const style = getComputedStyle(node);
    if (style.display === 'none') continue;
    const path = node.tagName === 'path' ? node.getAttribute('d') && new Path2D(node.getAttribute('d')) : null;
    if (node.tagName === 'path' && !path) continue;
    pen.lineWidth = parseFloat(style.strokeWidth);
    pen.lineJoin = 'round';
    pen.lineCap = style.strokeLinecap;
    pen.setLineDash(style.strokeDasharray === 'none' ? [] : style.strokeDasharray.split(/[ ,]+/).map(parseFloat));
    pen.strokeStyle = style.stroke;
    pen.fillStyle = style.fill;
    if (path) {
      if (style.fill !== 'none') pen.fill(path);
      if (style.stroke !== 'none') pen.stroke(path);
    } else {
      pen.font = `${style.fontWeight} ${style.fontSize} ${style.fontFamily}`;
      pen.textAlign = { start: 'left', middle: 'center', end: 'right' }[node.getAttribute('text-anchor')] ?? 'left';
      const place = [node.textContent, Number(node.getAttribute('x')), Number(node.getAttribute('y'))];
      if (style.stroke !== 'none') pen.strokeText(...place);
      pen.fillText(...place);
    }
  }
  pen.restore();
  pen.textAlign = 'left';
  pen.fillStyle = '#000';
  return height * scale + 8;
}

/** General warning sign of ISO 7010, W001. */
function paintSign(pen, x, y, wide) {
  pen.save();
  pen.translate(x, y);
  pen.scale(wide / 100, wide / 100);
  for (const [fill, shape] of [['#000', 'M50 4 97 86H3Z'], ['#f9a800', 'M50 19 84 78H16Z'], ['#000', 'M45 36h10l-2 24h-6Z'], ['#000', 'M45 69a5 5 0 1 0 10 0a5 5 0 1 0-10 0Z']]) {
    pen.fillStyle = fill;
    pen.fill(new Path2D(shape));
  }
  pen.restore();
}
