/* From a frame to its strands: where each runs, over and under which others.

   A frame is { strands, components, items, height, last, returnSpacing, ... }. Its items stand in
   the order in which the strands pass them: cells, each with one crossing; and at most one bundle,
   in which a few strands are on their way from one word to another. In a bundle every two strands
   keep their order in height, so that each moment of it is a diagram of the same braid. */

const SAMPLES = 10;

/* To the control points, in levels; and how far a strand slants between two levels. */
const STEEPNESS = 0.4, SLANT = 1.15;

/* How two or three strands run through the rows of a small word: for each, its crossings. */
function walkRows(letters, low, count) {
  const strands = Array.from({ length: count }, () => []);
  const at = strands.map((_, slot) => slot);
  const isOver = strands.map(() => strands.map(() => false));
  letters.forEach((letter, row) => {
    const left = Math.abs(letter) - 1 - low, first = at[left], second = at[left + 1];
    strands[first].push({ row, start: left, end: left + 1 });
    strands[second].push({ row, start: left + 1, end: left });
    isOver[first][second] = letter < 0;
    isOver[second][first] = letter > 0;
    [at[left], at[left + 1]] = [second, first];
  });
  const exits = [];
  at.forEach((slot, position) => { exits[slot] = position; });
  return { strands, exits, isOver, rows: letters.length };
}

/* The strands between the letters `before` and `after`, which are the same braid in place. */
function makeBundle(before, after, y, active) {
  const indices = [...before, ...after].map(Math.abs);
  const low = Math.min(...indices) - 1, count = Math.max(...indices) - low + 1;
  const walks = [walkRows(before, low, count), walkRows(after, low, count)];
  const main = before.length ? walks[0] : walks[1];
  return { low, count, walks, y, rows: main.rows, exits: main.exits, isOver: main.isOver, active };
}

/* Which way a strand goes in the first or the last row of a bundle, for both of its words. */
function bundleDirections(bundle, slot, isLast) {
  return bundle.walks.map(({ strands }) => {
    const steps = strands[slot], step = steps[isLast ? steps.length - 1 : 0];
    return step && step.row === (isLast ? bundle.rows - 1 : 0) ? step.end - step.start : 0;
  });
}

/* For each start position the passages of its strand through items. */
function tracePassages(frame) {
  const passages = Array.from({ length: frame.strands }, () => []);
  const at = passages.map((_, position) => position);
  for (const item of frame.items) {
    if (item.walks) {
      const entering = at.slice(item.low, item.low + item.count);
      entering.forEach((strand, slot) => {
        passages[strand].push({
          item, slot, start: item.low + slot, end: item.low + item.exits[slot],
          enters: bundleDirections(item, slot, false), leaves: bundleDirections(item, slot, true),
        });
        at[item.low + item.exits[slot]] = strand;
      });
    } else {
      const left = Math.abs(item.letter) - 1, right = left + 1;
      passages[at[left]].push({
        item, slot: 0, start: left, end: right, isOver: item.letter < 0,
        enters: [1, 1], leaves: [1, 1],
      });
      passages[at[right]].push({
        item, slot: 1, start: right, end: left, isOver: item.letter > 0,
        enters: [-1, -1], leaves: [-1, -1],
      });
      [at[left], at[right]] = [at[right], at[left]];
    }
  }
  const ends = [];
  at.forEach((strand, position) => { ends[strand] = position; });
  passages.forEach(setSlants);
  for (const item of frame.items) if (!item.walks) item.curves = [null, null];
  for (const each of passages.flat()) if (!each.item.walks) setCurve(each, frame.progress || 0);
  for (const item of frame.items) {
    if (!item.walks) item.time = meetingTime(item.curves[0], item.curves[1]);
  }
  return { passages, ends };
}

/* A strand that leads on in the same direction slants between two rows; the more room there is
   between them, the less. Both passages have two slants, for both words of a bundle. */
function setSlants(strand) {
  strand.forEach((passage, number) => {
    passage.slantIn = number ? strand[number - 1].slantOut : [0, 0];
    passage.slantOut = [0, 0];
    const following = strand[number + 1];
    if (!following) return;
    const gap = following.item.y - passage.item.y - passage.item.rows * M.levelHeight;
    let closeness = gap < 1e-6 ? 1 : Math.max(0, 1 - gap / (0.35 * M.levelHeight));
    closeness *= Math.min(passage.item.amplitude ?? 1, following.item.amplitude ?? 1);
    passage.slantOut = [0, 1].map((word) => (
      passage.leaves[word] && passage.leaves[word] === following.enters[word] ? closeness : 0
    ));
  });
}

/* The curve through a crossing, upright at its ends, or slanting there. */
function crossingCubic(start, end, top, slantIn, slantOut) {
  const bend = STEEPNESS * M.levelHeight, bottom = top + M.levelHeight;
  const x0 = start * M.strandSpacing, x1 = end * M.strandSpacing;
  const slant = SLANT * STEEPNESS * (x1 - x0);
  return [x0, top, x0 + slant * slantIn, top + bend, x1 - slant * slantOut, bottom - bend, x1, bottom];
}

function setCurve({ item, slot, start, end, slantIn, slantOut }, progress) {
  item.curves[slot] = crossingCubic(
    start, end, item.y, between(...slantIn, progress), between(...slantOut, progress),
  );
}

/* The x of a strand of a bundle at every sample of its rows, in the word before or after. */
function samplesOfWalk(bundle, word, passage) {
  const steps = bundle.walks[word].strands[passage.slot], found = [];
  let position = bundle.low + passage.slot, next = 0;
  for (let row = 0; row < bundle.rows; row += 1) {
    const step = steps[next];
    if (!step || step.row !== row) {
      for (let k = 0; k < SAMPLES; k += 1) found.push(position * M.strandSpacing);
      continue;
    }
    const way = step.end - step.start, before = steps[next - 1], after = steps[next + 1];
    const leadsOn = (other) => other && Math.abs(other.row - row) === 1
      && other.end - other.start === way;
    const slantIn = next ? Number(leadsOn(before) || 0) : passage.slantIn[word] * (row === 0);
    const isLast = next === steps.length - 1;
    const slantOut = isLast
      ? passage.slantOut[word] * (row === bundle.rows - 1) : Number(leadsOn(after) || 0);
    const cubic = crossingCubic(position, position + way, 0, slantIn, slantOut);
    for (let k = 0; k < SAMPLES; k += 1) {
      found.push(bernstein(cubic[0], cubic[2], cubic[4], cubic[6], k / SAMPLES));
    }
    position += way;
    next += 1;
  }
  found.push(position * M.strandSpacing);
  return found;
}

/* The heights of the samples, from the top of a bundle or of a cell. */
function sampleHeights(rows) {
  const bend = STEEPNESS * M.levelHeight, found = [];
  for (let k = 0; k <= rows * SAMPLES; k += 1) {
    const row = Math.min(Math.floor(k / SAMPLES), rows - 1);
    const inside = bernstein(0, bend, M.levelHeight - bend, M.levelHeight, k / SAMPLES - row);
    found.push(row * M.levelHeight + inside);
  }
  return found;
}

/* All strands of a bundle at this moment: x at every sample, and where each passes under. */
function bundleSamples(bundle, passages, progress) {
  const strands = passages.map((passage) => {
    const before = samplesOfWalk(bundle, 0, passage), after = samplesOfWalk(bundle, 1, passage);
    return { xs: before.map((x, k) => between(x, after[k], progress)), cuts: [] };
  });
  for (let one = 0; one < bundle.count; one += 1) {
    for (let other = one + 1; other < bundle.count; other += 1) {
      const meetings = meetingsOf(strands[one].xs, strands[other].xs);
      const lower = bundle.isOver[one][other] ? other : one;
      strands[lower].cuts.push(...meetings.map((at) => ({ at, pair: meetings })));
    }
  }
  return strands;
}

/* Where two strands cross, in samples. */
function meetingsOf(xs, others) {
  const found = [];
  for (let k = 0; k + 1 < xs.length; k += 1) {
    const here = xs[k] - others[k], there = xs[k + 1] - others[k + 1];
    if (here < 0 !== there < 0 && here !== there) found.push(k + here / (here - there));
  }
  return found;
}

/* Draw points x, y, x, y ... from where the pen is, lifted within a gap of each cut. */
function drawPoints(pen, points, cuts, gap) {
  if (!cuts.length) {
    pen.lines(points);
    return;
  }
  const lengths = [0];
  for (let k = 2; k < points.length; k += 2) {
    const chord = Math.hypot(points[k] - points[k - 2], points[k + 1] - points[k - 1]);
    lengths.push(lengths[lengths.length - 1] + chord);
  }
  const lengthAt = (sample) => {
    const k = Math.min(Math.floor(sample), lengths.length - 2);
    return between(lengths[k], lengths[k + 1], sample - k);
  };
  // Two crossings that are about to vanish share the room between them.
  const hidden = cuts.map(({ at, pair }) => {
    const room = pair.length > 1 ? Math.abs(lengthAt(pair[1]) - lengthAt(pair[0])) / 2 : gap;
    return [lengthAt(at) - Math.min(gap, room), lengthAt(at) + Math.min(gap, room)];
  }).sort((one, other) => one[0] - other[0]);
  const pointAt = (length) => {
    let k = lengths.findIndex((each) => each > length) - 1;
    if (k < 0) k = lengths.length - 2;
    const time = (length - lengths[k]) / (lengths[k + 1] - lengths[k] || 1);
    return [between(points[2 * k], points[2 * k + 2], time),
      between(points[2 * k + 1], points[2 * k + 3], time)];
  };
  let done = 0;
  for (const [start, end] of [...hidden, [lengths[lengths.length - 1] + 1, 0]]) {
    for (let k = 1; k < lengths.length; k += 1) {
      if (lengths[k] > done && lengths[k] < start) pen.line(points[2 * k], points[2 * k + 1]);
    }
    if (!end) return;
    if (start > done) pen.line(...pointAt(start));
    done = Math.max(done, end);
    pen.begin(...pointAt(Math.min(done, lengths[lengths.length - 1])));
  }
}
