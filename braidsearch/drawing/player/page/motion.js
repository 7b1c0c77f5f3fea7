/* What happens between two stages: every part of a step is a row of movements, and each movement
   gives the frame at any moment of it. Over and under are right in all of them. */

const smooth = (time) => time * time * (3 - 2 * time);

const frameOf = (state, items, height) => ({
  strands: state.strands,
  components: state.components,
  items,
  height,
  last: state.strands - 1,
  returnSpacing: returnSpacingOf(state.strands),
  progress: 0,
});

const frameOfStage = (stage) => frameOf(
  stage,
  stage.cells.map((cell) => ({ ...cell, was: cell.number, becomes: cell.number })),
  stage.height,
);

/* A movement: its length in seconds, and the frame at a time from 0 to 1. */
const movement = (seconds, frameAt) => ({ seconds, frameAt });

/* Letters move up and down to their places after: `pairs` of numbers before and after, in the
   order in which strands pass them. None where nothing moves. */
function shiftLetters(state, before, after, pairs, active = () => false) {
  const distance = pairs.reduce((most, [was, becomes]) => (
    Math.max(most, Math.abs(before.cells[was].y - after.cells[becomes].y))
  ), Math.abs(before.height - after.height));
  if (distance < 1e-6) return [];
  const seconds = 0.22 + 0.16 * Math.min(4, distance / M.levelHeight);
  return [movement(seconds, (time) => {
    const items = pairs.map(([was, becomes]) => ({
      ...before.cells[was],
      was,
      becomes,
      y: between(before.cells[was].y, after.cells[becomes].y, smooth(time)),
      active: active(was),
    }));
    items.sort((one, other) => one.y - other.y);
    return frameOf(state, items, between(before.height, after.height, smooth(time)));
  })];
}

const samePairs = (length) => Array.from({ length }, (_, number) => [number, number]);

/* The layout of a word with breaks of its stage and around a window. */
const laidOut = (word, breaks) => {
  const layout = arrangeRows(word, breaks);
  return { breaks, cells: cellsOf(word, layout), height: heightOf(layout.count) };
};

function relationMovements(before, part, after) {
  const [, at, taken, put] = part;
  if (taken.length === 2 && put.length === 2) return farCommutation(before, at, after);
  if (!taken.length) {
    const back = relationMovements(after, ["relation", at, put, taken], before);
    return reversedMovements(back);
  }
  const window = laidOut(before.word, new Set([...before.breaks, at, at + taken.length]));
  const same = samePairs(before.word.length);
  const isActive = (number) => number >= at && number < at + taken.length;
  const bundle = makeBundle(taken, put, window.cells[at].y, true);
  const around = window.cells.map((cell) => ({
    ...cell, was: cell.number, becomes: cell.number - taken.length + put.length,
  }));
  const items = [...around.slice(0, at), bundle, ...around.slice(at + taken.length)];
  for (const cell of items.slice(0, at)) cell.becomes = cell.was;
  const change = movement(0.95, (time) => ({
    ...frameOf(before, items.map((item) => ({ ...item })), window.height),
    progress: smooth(time),
  }));
  return [
    ...shiftLetters(before, before, window, same, isActive),
    change,
    ...closeUp(before, window, part, after),
  ];
}

/* After the change in its window the letters move to the places of the next stage. */
function closeUp(state, window, [, at, taken, put], after) {
  if (put.length === taken.length) {
    const settled = { ...window, cells: cellsWith(window.cells, at, put) };
    const isActive = (number) => number >= at && number < at + put.length;
    return shiftLetters(state, settled, after, samePairs(after.word.length), isActive);
  }
  const kept = window.cells.map((cell) => cell.number)
    .filter((number) => number < at || number >= at + taken.length)
    .map((number) => [number, number < at ? number : number - taken.length]);
  return shiftLetters(state, window, after, kept);
}

const cellsWith = (cells, at, letters) => cells.map((cell, number) => (
  number >= at && number < at + letters.length ? { ...cell, letter: letters[number - at] } : cell
));

/* Two crossings on strands of their own pass each other. */
function farCommutation(before, at, after) {
  const pairs = samePairs(before.word.length);
  pairs[at] = [at, at + 1];
  pairs[at + 1] = [at + 1, at];
  const moved = shiftLetters(before, before, after, pairs, (was) => was === at || was === at + 1);
  return moved.length ? moved : [movement(0.2, () => frameOfStage(after))];
}

const reversedMovements = (movements) => movements.map(({ seconds, frameAt, closedFrameAt }) => ({
  seconds,
  frameAt: (time) => swapped(frameAt(1 - time)),
  closedFrameAt: closedFrameAt && ((time) => swapped(closedFrameAt(1 - time))),
})).reverse();

const swapped = (frame) => ({
  ...frame,
  items: frame.items.map((item) => ({ ...item, was: item.becomes, becomes: item.was })),
});

/* Letters at the front go around to the end: in the closure on the way back of the strands, in the
   open braid out at the top and in at the bottom. */
function turnMovements(before, part, after) {
  if (part[1] < 0) return reversedMovements(turnMovements(after, ["turn", -part[1]], before));
  const count = part[1], length = before.word.length;
  const window = laidOut(before.word, new Set([...before.breaks, count]));
  const goal = laidOut(after.word, new Set([...after.breaks, length - count]));
  const turned = (isClosed) => (time) => {
    const at = smooth(time), height = between(window.height, goal.height, at);
    const frame = frameOf(before, [], height);
    const around = isClosed ? annulusOf(frame).period : 0;
    const letter = (number, becomes, start, end) => ({
      ...before.cells[number], was: number, becomes,
      y: between(start, end, at), active: number < count,
    });
    const rest = window.cells.slice(count)
      .map((cell) => letter(cell.number, cell.number - count, cell.y, goal.cells[cell.number - count].y));
    const front = window.cells.slice(0, count);
    const leaving = front.map((cell) => {
      const end = goal.cells[length - count + cell.number].y;
      return letter(cell.number, length - count + cell.number, cell.y,
        isClosed ? end - around : cell.y - window.cells[count].y);
    });
    frame.items = [...leaving, ...rest];
    if (!isClosed) {
      frame.isClipped = true;
      frame.items.push(...front.map((cell) => {
        const end = goal.cells[length - count + cell.number].y;
        return letter(cell.number, length - count + cell.number,
          cell.y - M.lead + window.height, end);
      }));
    }
    return frame;
  };
  const seconds = Math.min(2.2, 0.8 + 0.15 * count);
  return [
    ...shiftLetters(before, before, window, samePairs(length), (number) => number < count),
    { seconds, frameAt: turned(false), closedFrameAt: turned(true) },
    ...shiftLetters(after, goal, after, samePairs(length), (number) => number >= length - count),
  ];
}

/* A letter and its inverse: in the closure both arise on the way back and part; in the open braid
   they come in at its ends. */
function conjugationMovements(before, part, after) {
  const by = part[1], length = after.word.length;
  const goal = laidOut(after.word, new Set([...after.breaks, 1, length - 1]));
  const frameAt = (time) => {
    const at = smooth(time);
    const items = goal.cells.map((cell) => ({
      ...cell, was: cell.number - 1, becomes: cell.number,
      active: cell.number === 0 || cell.number === length - 1,
    }));
    const frame = frameOf(after, items, between(before.height, goal.height, at));
    const out = M.levelHeight + M.lead;
    items.forEach((item, number) => {
      const start = number === 0 ? -out
        : number === length - 1 ? before.height + M.lead : before.cells[number - 1].y;
      item.y = between(start, goal.cells[number].y, at);
      if (item.active) item.was = null;
    });
    frame.isClipped = true;
    return frame;
  };
  const closedFrameAt = (time) => conjugatedClosure(before, goal, by, time);
  return [
    { seconds: 1.1, frameAt, closedFrameAt },
    ...shiftLetters(after, goal, after, samePairs(length)),
  ];
}

function conjugatedClosure(before, goal, by, time) {
  const length = goal.cells.length;
  const rise = smooth(Math.min(1, time / 0.45)), part = smooth(Math.max(0, time / 0.55 - 0.45 / 0.55));
  const kept = before.cells.map((cell) => ({
    ...cell, was: cell.number, becomes: cell.number + 1,
    y: between(cell.y, goal.cells[cell.number + 1].y, part),
  }));
  const frame = frameOf(before, kept, between(before.height, goal.height, part));
  const { back, period } = annulusOf(frame);
  if (part === 0) {
    const bundle = makeBundle([], [by, -by], -back / 2 - M.levelHeight, true);
    bundle.rows = 2;
    frame.items = [bundle, ...kept];
    frame.progress = rise;
    return frame;
  }
  const last = goal.cells[length - 1], first = goal.cells[0];
  const item = (cell, start, end) => ({
    ...cell, was: null, becomes: cell.number, active: true, y: between(start, end, part),
  });
  frame.items = [
    item(last, -back / 2 - M.levelHeight, last.y - period),
    item(first, -back / 2, first.y),
    ...kept,
  ];
  return frame;
}

/* A new strand grows, then its crossing with the last one; in the closure a kink grows to a loop. */
function stabilizationMovements(before, part, after) {
  const length = after.word.length, strands = before.strands;
  const kept = before.word.length;
  const layout = { ...laidOut(after.word, new Set([...after.breaks, kept])) };
  const letters = layout.cells.slice(0, kept)
    .map((cell) => ({ ...cell, was: cell.number, becomes: cell.number }));
  const make = (items) => frameOf(after, items.map((item) => ({ ...item })), layout.height);
  const room = { ...before, cells: layout.cells.slice(0, kept), height: layout.height };
  const growing = (time) => ({
    ...make(letters),
    growing: { position: strands, share: smooth(time) * 0.999 },
    last: between(strands - 1, strands, smooth(Math.min(1, 2 * time))),
  });
  const crossing = (time) => ({
    ...make([...letters, makeBundle([], [part[1]], layout.cells[kept].y, true)]),
    progress: smooth(time),
  });
  const frameAt = (time) => (time < 0.45 ? growing(time / 0.45) : crossing((time - 0.45) / 0.55));
  const closedFrameAt = (time) => {
    const open = smooth(Math.min(1, time / 0.3)), size = smooth(Math.max(0, time / 0.7 - 3 / 7));
    const amplitude = Math.min(1, 2 * size);
    const kink = size < 1 ? { size, amplitude } : null;
    const frame = make([...letters, {
      ...layout.cells[kept], was: null, becomes: kept, active: true, kink, amplitude,
    }]);
    frame.kink = kink;
    frame.last = between(strands - 1, strands, open);
    frame.returnSpacing = between(
      returnSpacingOf(strands), returnSpacingOf(strands + 1), open,
    );
    return frame;
  };
  return [
    ...shiftLetters(before, before, room, samePairs(kept)),
    { seconds: 1.3, frameAt, closedFrameAt },
    ...shiftLetters(after, layout, after, samePairs(length)),
  ];
}

/* Too many relations to be shown one by one: one picture fades into the other. */
const rewritingMovements = (before, part, after) => [movement(0.9, (time) => ({
  ...frameOfStage(time < 0.5 ? before : after),
  fading: { other: frameOfStage(time < 0.5 ? after : before), share: time < 0.5 ? time : 1 - time },
}))];

/* The movements of a part, with the whole time that they take. */
function movementsOf(before, part, after) {
  const make = {
    relation: relationMovements,
    stay: (from, _, to) => [
      movement(0.3, () => frameOfStage(from)),
      ...shiftLetters(from, from, to, samePairs(from.word.length)),
    ],
    turn: turnMovements,
    conjugation: conjugationMovements,
    stabilization: stabilizationMovements,
    destabilization: (from, [, letter], to) => (
      reversedMovements(stabilizationMovements(to, ["stabilization", letter], from))
    ),
  }[part[0]] || rewritingMovements;
  const rows = make(before, part, after);
  return { rows, seconds: rows.reduce((sum, { seconds }) => sum + seconds, 0) };
}

/* The frame of a part at a time from 0 to 1. */
function frameOfPart({ rows, seconds }, time, isClosed) {
  let at = time * seconds;
  for (const row of rows) {
    if (at <= row.seconds || row === rows[rows.length - 1]) {
      const share = Math.min(1, row.seconds ? at / row.seconds : 1);
      return (isClosed && row.closedFrameAt ? row.closedFrameAt : row.frameAt)(share);
    }
    at -= row.seconds;
  }
  return null;
}
