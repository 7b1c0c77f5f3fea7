/* Cubic curves, each an array of eight numbers (x and y of its control points), and the pen that
   writes them as path data. The same constructions as in the Python module of this name. */

const between = (start, end, time) => (start === end ? start : start + (end - start) * time);

const straightCubic = (x0, y0, x1, y1) => [
  x0, y0,
  between(x0, x1, 1 / 3), between(y0, y1, 1 / 3),
  between(x0, x1, 2 / 3), between(y0, y1, 2 / 3),
  x1, y1,
];

const QUARTER = (4 / 3) * (Math.SQRT2 - 1);

/* A quarter of an ellipse with upright axes, which bends at the corner. */
const quarterCubic = (x0, y0, cornerX, cornerY, x1, y1) => [
  x0, y0,
  between(x0, cornerX, QUARTER), between(y0, cornerY, QUARTER),
  between(x1, cornerX, QUARTER), between(y1, cornerY, QUARTER),
  x1, y1,
];

/* The parts before and after a time, by de Casteljau's construction. */
function splitCubic(cubic, time) {
  const [ax, ay, bx, by, cx, cy, dx, dy] = cubic;
  const abx = between(ax, bx, time), aby = between(ay, by, time);
  const bcx = between(bx, cx, time), bcy = between(by, cy, time);
  const cdx = between(cx, dx, time), cdy = between(cy, dy, time);
  const abcx = between(abx, bcx, time), abcy = between(aby, bcy, time);
  const bcdx = between(bcx, cdx, time), bcdy = between(bcy, cdy, time);
  const x = between(abcx, bcdx, time), y = between(abcy, bcdy, time);
  return [
    [ax, ay, abx, aby, abcx, abcy, x, y],
    [x, y, bcdx, bcdy, cdx, cdy, dx, dy],
  ];
}

const backwards = ([ax, ay, bx, by, cx, cy, dx, dy]) => [dx, dy, cx, cy, bx, by, ax, ay];

/* One coordinate of a cubic at a time, from its four Bernstein coefficients. */
function bernstein(a, b, c, d, time) {
  const rest = 1 - time;
  return (a * rest + 3 * b * time) * rest * rest + (3 * c * rest + d * time) * time * time;
}

const pointOfCubic = (cubic, time) => [
  bernstein(cubic[0], cubic[2], cubic[4], cubic[6], time),
  bernstein(cubic[1], cubic[3], cubic[5], cubic[7], time),
];

const LENGTH_SAMPLES = 16;

/* The time at which the curve has run so far from its start; 1 where it is shorter. */
function timeOfLength(cubic, length) {
  let x = cubic[0], y = cubic[1], run = 0;
  for (let step = 1; step <= LENGTH_SAMPLES; step += 1) {
    const [nextX, nextY] = pointOfCubic(cubic, step / LENGTH_SAMPLES);
    const chord = Math.hypot(nextX - x, nextY - y);
    if (run + chord >= length) return (step - 1 + (length - run) / chord) / LENGTH_SAMPLES;
    x = nextX;
    y = nextY;
    run += chord;
  }
  return 1;
}

/* An under-strand before and after its crossing, each without its part near the crossing. */
function cutOpen(cubic, time, gap) {
  const [before, after] = splitCubic(cubic, time);
  const turned = backwards(before);
  const kept = splitCubic(turned, timeOfLength(turned, gap))[1];
  return [backwards(kept), splitCubic(after, timeOfLength(after, gap))[1]];
}

/* Two strands of a crossing have the same heights at the same times, so they meet where the
   difference of their x is zero; its coefficients change sign once, hence it has one zero. */
function meetingTime(first, second) {
  const a = first[0] - second[0], b = first[2] - second[2];
  const c = first[4] - second[4], d = first[6] - second[6];
  let low = 0, high = 1;
  for (let step = 0; step < 40; step += 1) {
    const middle = (low + high) / 2;
    if (bernstein(a, b, c, d, middle) > 0 === a > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

const rounded = (value) => Math.round(value * 100) / 100 || 0;

/* Writes strands as path data. `place` maps the braid's own frame to the page; `bend`, which may be
   changed on the way, moves points before that. A run is what lies between two undercrossings. */
class Pen {
  constructor(place) {
    this.place = place;
    this.bend = null;
    this.runs = [];
  }

  point(x, y) {
    const [bentX, bentY] = this.bend ? this.bend(x, y) : [x, y];
    return this.place(bentX, bentY);
  }

  begin(x, y) {
    const start = this.point(x, y);
    this.runs.push({ start, pieces: [], end: start });
  }

  line(x, y) {
    const run = this.runs[this.runs.length - 1];
    const end = this.point(x, y), start = run.end, last = run.pieces[run.pieces.length - 1];
    run.end = end;
    if (last && last.length === 2 && continues(run.before, start, end)) {
      run.pieces[run.pieces.length - 1] = end;
      return;
    }
    run.before = start;
    run.pieces.push(end);
  }

  curve(cubic) {
    const run = this.runs[this.runs.length - 1];
    const end = this.point(cubic[6], cubic[7]);
    const first = this.point(cubic[2], cubic[3]), second = this.point(cubic[4], cubic[5]);
    run.pieces.push([...first, ...second, ...end]);
    run.end = end;
  }

  /* The points x, y, x, y ... as a line, from where the pen is. */
  lines(points) {
    for (let k = 2; k < points.length; k += 2) this.line(points[k], points[k + 1]);
  }

  /* An under-strand: the pen is lifted before the crossing and set down behind it. */
  under(cubic, time, gap) {
    const [before, after] = cutOpen(cubic, time, gap);
    this.curve(before);
    this.begin(after[0], after[1]);
    this.curve(after);
  }

  /* What was drawn; a closed curve that passes under somewhere begins behind an undercrossing. */
  pathData(isClosed) {
    const runs = this.runs.filter(({ pieces }) => pieces.length);
    if (isClosed && runs.length > 1) {
      const first = runs.shift(), last = runs.pop();
      runs.unshift({ start: last.start, pieces: joinedPieces(last, first) });
      return runs.map(runData).join(" ");
    }
    return runs.map(runData).join(" ") + (isClosed ? "Z" : "");
  }
}

/* Whether a line from `start` to `end` goes on in the upright or level direction of the last one. */
function continues(before, start, end) {
  return (before[0] === start[0] && start[0] === end[0])
    || (before[1] === start[1] && start[1] === end[1]);
}

function joinedPieces(first, second) {
  const pieces = [...first.pieces], last = pieces[pieces.length - 1], next = second.pieces[0];
  if (last && next && last.length === 2 && next.length === 2
    && continues(first.before, last, next)) pieces.pop();
  return [...pieces, ...second.pieces];
}

function runData({ start, pieces }) {
  let data = `M${rounded(start[0])} ${rounded(start[1])}`;
  for (const piece of pieces) {
    data += piece.length === 2 ? "L" : "C";
    for (let k = 0; k < piece.length; k += 1) data += (k ? " " : "") + rounded(piece[k]);
  }
  return data;
}
