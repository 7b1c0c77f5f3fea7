/* From a frame to path data: the braid with open ends, and its closure around an annulus. */

/* Draw one passage through an item whose place in the plane `onPage` gives; null where the item
   lies in the straight part, moved downwards by `shift`. */
function drawPassage(pen, frame, passage, bundles, shift, onPage) {
  const { item, slot } = passage;
  if (item.walks) {
    const { xs, cuts } = bundles.get(item)[slot];
    const heights = sampleHeights(item.rows), points = [];
    xs.forEach((x, k) => {
      const y = item.y + heights[k];
      points.push(...(onPage ? onPage(x / M.strandSpacing, y) : [x, y + shift]));
    });
    drawPoints(pen, points, cuts, M.gap);
    return xs[xs.length - 1];
  }
  const cubic = item.curves[slot], isUnder = !passage.isOver;
  if (onPage) {
    const points = [];
    for (let k = 0; k <= SAMPLES; k += 1) {
      const [x, y] = pointOfCubic(cubic, k / SAMPLES);
      points.push(...onPage(x / M.strandSpacing, y));
    }
    drawPoints(pen, points, isUnder ? [{ at: item.time * SAMPLES, pair: [] }] : [], M.gap);
  } else {
    const moved = shift ? cubic.map((value, k) => (k % 2 ? value + shift : value)) : cubic;
    if (item.kink) drawKink(pen, item, moved, slot, isUnder);
    else if (isUnder) pen.under(moved, item.time, M.gap);
    else pen.curve(moved);
  }
  return cubic[6];
}

function bundleMap(frame, passages) {
  const found = new Map();
  for (const item of frame.items) {
    if (!item.walks) continue;
    const entering = passages.flat().filter((passage) => passage.item === item);
    entering.sort((one, other) => one.slot - other.slot);
    found.set(item, bundleSamples(item, entering, frame.progress || 0));
  }
  return found;
}

/* The strands from top to bottom: { paths: Map(component -> data), arrows, crossings }. */
function drawOpen(frame, place) {
  const { passages } = tracePassages(frame), bundles = bundleMap(frame, passages);
  const paths = new Map(), arrows = [];
  const { items, height } = frame, last = items[items.length - 1];
  const top = items.length ? Math.min(0, items[0].y) : 0;
  const bottom = last ? Math.max(height, last.y + last.rows * M.levelHeight) : height;
  passages.forEach((strand, position) => {
    const component = frame.components[position];
    const length = position === frame.growing?.position ? frame.growing.share : 1;
    const pen = new Pen(place);
    let x = position * M.strandSpacing, y = top;
    pen.begin(x, top);
    for (const passage of strand) {
      if (passage.item.y > y + 1e-9) pen.line(x, passage.item.y);
      x = drawPassage(pen, frame, passage, bundles, 0, null);
      y = passage.item.y + passage.item.rows * M.levelHeight;
    }
    const isWhole = length === 1 && bottom === height;
    pen.line(x, isWhole ? height - 0.7 * M.arrowLength : top + length * (bottom - top));
    if (isWhole) arrows.push({ component, x, y: height - M.arrowLength / 2, down: 1 });
    addPath(paths, component, pen.pathData(false));
  });
  return { paths, arrows };
}

function addPath(paths, component, data) {
  paths.set(component, paths.has(component) ? `${paths.get(component)} ${data}` : data);
}

/* How the strand at a position, which may lie between two, leads back on the right. */
function returnOf(frame, position) {
  const outwards = (frame.last - position) * frame.returnSpacing;
  const x = position * M.strandSpacing, lastX = frame.last * M.strandSpacing;
  const middle = lastX + M.closingGap / 2, right = lastX + M.closingGap + outwards;
  const rise = M.closingGap / 2 + outwards, { height } = frame;
  return [
    quarterCubic(x, height, x, height + rise, middle, height + rise),
    quarterCubic(middle, height + rise, right, height + rise, right, height),
    straightCubic(right, height, right, 0),
    quarterCubic(right, 0, right, -rise, middle, -rise),
    quarterCubic(middle, -rise, x, -rise, x, 0),
  ];
}

/* The way around the annulus: `y` from 0 to the height runs through the braid, from `-back` to 0
   back outside it, and so on with the period of both. */
function annulusOf(frame) {
  const bow = 0.75 * (M.closingGap + frame.last * frame.returnSpacing);
  const back = frame.height + 4 * bow, period = frame.height + back;
  const lengths = [bow, bow, frame.height, bow, bow];
  const inPeriod = (y) => {
    const rest = (((y + back) % period) + period) % period;
    return (period - rest < 1e-6 ? 0 : rest) - back;
  };
  const onPage = (position, y) => {
    const at = inPeriod(y);
    if (at >= 0) return [position * M.strandSpacing, at];
    let way = at + back, piece = 0;
    while (piece < 4 && way > lengths[piece]) way -= lengths[piece++];
    return pointOfCubic(returnOf(frame, position)[piece], Math.min(1, way / lengths[piece]));
  };
  return { back, period, inPeriod, onPage };
}

/* A strand that keeps its position between two heights of the annulus. */
function drawUpright(pen, frame, annulus, position, start, end) {
  let y = start;
  while (y < end - 1e-6) {
    const at = annulus.inPeriod(y);
    if (at >= -1e-6) {
      const way = Math.min(end - y, frame.height - at);
      pen.line(position * M.strandSpacing, at + way);
      y += way;
    } else {
      const way = Math.min(end - y, -at);
      if (at < -annulus.back + 1e-6 && way > annulus.back - 1e-6) {
        const [down, out, up, over, home] = returnOf(frame, position);
        [down, out].forEach((cubic) => pen.curve(cubic));
        pen.line(up[6], up[7]);
        [over, home].forEach((cubic) => pen.curve(cubic));
      } else {
        const steps = Math.max(2, Math.ceil(way / 6));
        for (let k = 1; k <= steps; k += 1) {
          pen.line(...annulus.onPage(position, y + (way * k) / steps));
        }
      }
      y += way;
    }
  }
}

/* Whether an item lies in the straight part, and how far it is moved there. */
function shiftOf(frame, annulus, item) {
  const at = annulus.inPeriod(item.y), bottom = at + item.rows * M.levelHeight;
  return at >= -1e-6 && bottom <= frame.height + 1e-6 ? at - item.y : null;
}

/* The closed strands, each component from the first of its positions on. */
function drawClosed(frame, place) {
  const { passages, ends } = tracePassages(frame), bundles = bundleMap(frame, passages);
  const annulus = annulusOf(frame), paths = new Map(), arrows = [], seen = new Set();
  const start = frame.items.length ? Math.min(0, frame.items[0].y) : 0;
  for (let first = 0; first < frame.strands; first += 1) {
    if (seen.has(first)) continue;
    const pen = new Pen(place), component = frame.components[first];
    pen.begin(...annulus.onPage(first, start));
    let position = first;
    do {
      seen.add(position);
      let y = start, at = position;
      for (const passage of passages[position]) {
        const { item } = passage, shift = shiftOf(frame, annulus, item);
        drawUpright(pen, frame, annulus, at, y, item.y);
        drawPassage(pen, frame, passage, bundles, shift || 0, shift === null ? annulus.onPage : null);
        y = item.y + item.rows * M.levelHeight;
        at = passage.end;
      }
      drawUpright(pen, frame, annulus, at, y, start + annulus.period);
      const up = returnOf(frame, position)[2];
      if (!frame.kink || position !== frame.strands - 1) {
        arrows.push({ component, x: up[0], y: frame.height / 2, down: -1 });
      }
      position = ends[position];
    } while (position !== first);
    addPath(paths, component, pen.pathData(true));
  }
  return { paths, arrows, annulus };
}

/* The crossing of a new strand in the closure: the loop beyond it is drawn towards the crossing,
   and what is left of the crossing straightens. */
function drawKink(pen, item, cubic, slot, isUnder) {
  const [before, after] = splitCubic(cubic, item.time);
  const { size, amplitude } = item.kink;
  const axis = (Math.abs(item.letter) - 1) * M.strandSpacing;
  const squeeze = (x, y) => [axis + amplitude * (x - axis), y];
  const middle = squeeze(before[6], before[7]);
  // Wider sooner than longer, so that its two sides are seen apart from early on.
  const shrink = (x, y) => [
    middle[0] + Math.sqrt(size) * (x - before[6]), middle[1] + size * (y - before[7]),
  ];
  const gap = M.gap * Math.min(1, 3 * size);
  const [first, second] = isUnder && gap > 0.2 ? cutOpen(cubic, item.time, gap) : [before, after];
  pen.bend = slot === 0 ? squeeze : shrink;
  pen.curve(first);
  pen.bend = slot === 0 ? shrink : squeeze;
  if (isUnder && gap > 0.2) pen.begin(second[0], second[1]);
  pen.curve(second);
  if (slot === 1) pen.bend = null;
}
