/* Writing frames into an SVG element, which keeps its elements from frame to frame. */

const SVG = "http://www.w3.org/2000/svg";

/* The light line inside a strand; room for the numbers of strands; the head of an arrow. */
const INLAY = 1.3, NUMBER_ROOM = 22, ARROW_WIDTH = 10, ARROW_NOTCH = 2.8;

/* Sizes of letters and of numbers of strands; the width of a character in units of its size; and
   how far a mark stays away from the letters in it. */
const LETTER_SIZE = 9.5, NUMBER_SIZE = 10.5, CHARACTER = 0.62, LETTER_MARGIN = 3.5;
const ARROW = [
  [M.arrowLength / 2, 0],
  [-M.arrowLength / 2, ARROW_WIDTH / 2],
  [ARROW_NOTCH - M.arrowLength / 2, 0],
  [-M.arrowLength / 2, -ARROW_WIDTH / 2],
].map((point) => point.join(" ")).join("L");

function makeElement(name, attributes = {}, parent = null) {
  const element = document.createElementNS(SVG, name);
  for (const [key, value] of Object.entries(attributes)) element.setAttribute(key, value);
  if (parent) parent.append(element);
  return element;
}

/* Elements of one kind of which as many as needed are shown; values are written when they change. */
class Pool {
  constructor(name, parent, attributes = {}) {
    Object.assign(this, { name, parent, attributes, elements: [], used: 0 });
  }

  start() { this.used = 0; }

  next(values, text = null) {
    if (this.used === this.elements.length) {
      const element = makeElement(this.name, this.attributes, this.parent);
      this.elements.push({ element, values: {}, text: null });
    }
    const kept = this.elements[this.used];
    this.used += 1;
    for (const [key, value] of Object.entries(values)) {
      if (kept.values[key] !== value) kept.element.setAttribute(key, value);
      kept.values[key] = value;
    }
    if (text !== kept.text) kept.element.textContent = text;
    kept.text = text;
    if (kept.isHidden) kept.element.removeAttribute("display");
    kept.isHidden = false;
  }

  end() {
    for (const kept of this.elements.slice(this.used)) {
      if (!kept.isHidden) kept.element.setAttribute("display", "none");
      kept.isHidden = true;
    }
  }
}

let pictureCount = 0;

class Picture {
  constructor(holder) {
    const id = `picture-${pictureCount += 1}`;
    this.svg = makeElement("svg", {
      role: "img", "aria-labelledby": `${id}-title ${id}-description`, class: "braid",
    });
    this.title = makeElement("title", { id: `${id}-title` }, this.svg);
    this.description = makeElement("desc", { id: `${id}-description` }, this.svg);
    const clip = makeElement("clipPath", { id: `${id}-clip` }, makeElement("defs", {}, this.svg));
    this.clipBox = makeElement("rect", {}, clip);
    this.clipName = `url(#${id}-clip)`;
    this.body = makeElement("g", {}, this.svg);
    this.boxes = new Pool("rect", makeElement("g", {}, this.body), { rx: 7 });
    const lines = makeElement("g", { fill: "none", stroke: M.hairline }, this.svg);
    this.lines = new Pool("path", lines);
    this.strands = [makeElement("g", {}, this.body), makeElement("g", {}, this.body)];
    for (const group of this.strands) {
      for (const [key, value] of [["fill", "none"], ["stroke-width", M.stroke],
        ["stroke-linejoin", "round"]]) group.setAttribute(key, value);
    }
    this.paths = this.strands.map((group) => new Pool("path", group));
    this.arrows = new Pool("path", makeElement("g", {}, this.body));
    const text = { "font-family": M.font, fill: M.ink };
    this.letters = new Pool("text", makeElement("g", text, this.body));
    this.numbers = new Pool("text", makeElement("g", text, this.svg));
    this.enlarge(1);
    holder.append(this.svg);
  }

  /* Write letters and numbers larger, where the whole picture is shown small. */
  enlarge(times) {
    if (this.times === times) return;
    this.times = times;
    this.letters.parent.setAttribute("font-size", rounded(LETTER_SIZE * times));
    this.numbers.parent.setAttribute("font-size", rounded(NUMBER_SIZE * times));
  }

  /* Draw a frame. `view` is { isClosed, isRight, hasLetters }. */
  draw(frame, view) {
    const place = view.isRight ? (x, y) => [y, -x] : (x, y) => [x, y];
    [this.boxes, this.lines, this.arrows, this.letters, this.numbers].forEach((pool) => pool.start());
    const drawn = this.drawStrands(frame, view, place, 0);
    if (frame.fading) {
      this.drawStrands(frame.fading.other, view, place, 1);
      this.strands[0].setAttribute("opacity", 1 - frame.fading.share);
      this.strands[1].setAttribute("opacity", frame.fading.share);
    } else {
      this.strands[0].removeAttribute("opacity");
      this.paths[1].start();
      this.paths[1].end();
    }
    const centres = new Map(frame.items.map((item) => [item, centreOf(item, frame, drawn.annulus)]));
    this.drawBoxes(frame, centres, view, place);
    if (view.hasLetters) this.drawLetters(frame, centres, view, place);
    this.drawEnds(frame, view, place);
    this.clip(frame, view, place);
    [this.boxes, this.lines, this.arrows, this.letters, this.numbers].forEach((pool) => pool.end());
  }

  drawStrands(frame, view, place, layer) {
    const drawn = (view.isClosed ? drawClosed : drawOpen)(frame, place), pool = this.paths[layer];
    pool.start();
    for (const component of [...drawn.paths.keys()].sort((one, other) => one - other)) {
      const d = drawn.paths.get(component);
      const dashes = M.dashes[component % M.dashes.length];
      const stroke = M.colours[component % M.colours.length];
      pool.next({ d, stroke, "stroke-width": M.stroke, "stroke-dasharray": "none" });
      if (dashes) pool.next({ d, stroke: M.paper, "stroke-width": INLAY, "stroke-dasharray": dashes });
    }
    pool.end();
    if (layer) return drawn;
    for (const { component, x, y, down } of drawn.arrows) {
      const at = place(x, y), angle = view.isRight ? 90 - 90 * down : 90 * down;
      this.arrows.next({
        d: `M${ARROW}Z`,
        fill: M.colours[component % M.colours.length],
        transform: `translate(${rounded(at[0])} ${rounded(at[1])}) rotate(${angle})`,
      });
    }
    return drawn;
  }

  /* A soft band, or a dashed outline, around the letters of each mark. */
  drawBoxes(frame, centres, view, place) {
    const side = M.strandSpacing / 2 + 7, end = M.levelHeight / 2 - 1.5;
    for (const { items, isFrame, opacity } of groupsOf(frame)) {
      const found = items.map((item) => [item, centres.get(item)]);
      if (opacity <= 0 || found.some(([, centre]) => centre.isAway)) continue;
      let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
      for (const [item, { x, y }] of found) {
        const wide = item.walks ? ((item.count - 2) * M.strandSpacing) / 2 : 0;
        const long = ((item.rows - 1) * M.levelHeight) / 2;
        left = Math.min(left, x - wide - side);
        right = Math.max(right, x + wide + side + (view.hasLetters ? 8 : 0));
        top = Math.min(top, y - long - end);
        bottom = Math.max(bottom, y + long + end);
      }
      const rectangles = [[...place(left, top), ...place(right, bottom)]];
      if (view.hasLetters && !frame.fading) {
        for (const [item, { meeting }] of found) {
          if (!item.walks) rectangles.push(this.roomOfLetter(item, place(...meeting), view));
        }
      }
      const xs = rectangles.flatMap(([x0, , x1]) => [x0, x1]);
      const ys = rectangles.flatMap(([, y0, , y1]) => [y0, y1]);
      const x = Math.min(...xs), y = Math.min(...ys);
      this.boxes.next({
        x: rounded(x),
        y: rounded(y),
        width: rounded(Math.max(...xs) - x),
        height: rounded(Math.max(...ys) - y),
        opacity: rounded(opacity),
        fill: isFrame ? "none" : M.band,
        stroke: isFrame ? M.frame : "none",
        "stroke-width": 1.2,
        "stroke-dasharray": "3 3",
      });
    }
  }

  drawLetters(frame, centres, view, place) {
    for (const item of frame.items) {
      if (item.walks || frame.fading) continue;
      const [x, y] = this.placeOfLetter(place(...centres.get(item).meeting), view);
      this.letters.next({
        transform: `translate(${rounded(x)} ${rounded(y)})`,
        "text-anchor": view.isRight ? "middle" : "start",
      }, String(item.letter).replace("-", "\u2212"));
    }
  }

  /* Where the base line of a letter begins, or, sideways, has its middle. */
  placeOfLetter([x, y], { isRight }) {
    return isRight ? [x, y - M.strandSpacing / 2 - 4.5] : [x + 9.5, y + 3.4 * this.times];
  }

  roomOfLetter({ letter }, meeting, view) {
    const size = LETTER_SIZE * this.times, width = String(letter).length * size * CHARACTER;
    const [x, y] = this.placeOfLetter(meeting, view), left = view.isRight ? x - width / 2 : x;
    return [
      left - LETTER_MARGIN, y - 0.74 * size - LETTER_MARGIN,
      left + width + LETTER_MARGIN, y + LETTER_MARGIN,
    ];
  }

  /* The hairlines on which strands begin and end, and the numbers of positions. */
  drawEnds(frame, { isClosed, isRight }, place) {
    if (!isClosed) {
      for (const y of [0, frame.height]) {
        const start = place(-8, y), end = place(frame.last * M.strandSpacing + 8, y);
        this.lines.next({ d: `M${start.map(rounded).join(" ")}L${end.map(rounded).join(" ")}` });
      }
    }
    const half = 3.7 * this.times; // of the height of a number
    const shifts = isClosed
      ? [[0, -5, "middle"], [-5, half, "end"]] : [[-7, half, "end"], [0, -7, "middle"]];
    const [right, down, anchor] = shifts[isRight ? 0 : 1];
    for (let position = 0; position <= Math.round(frame.last); position += 1) {
      const [x, y] = place(position * M.strandSpacing, 0);
      this.numbers.next({ x: x + right, y: rounded(y + down), "text-anchor": anchor }, String(position + 1));
    }
  }

  clip(frame, view, place) {
    if (!frame.isClipped || view.isClosed) {
      this.body.removeAttribute("clip-path");
      return;
    }
    const [x0, y0] = place(-100, 0), [x1, y1] = place(frame.last * M.strandSpacing + 100, frame.height);
    for (const [key, value] of Object.entries({
      x: Math.min(x0, x1), y: Math.min(y0, y1), width: Math.abs(x1 - x0), height: Math.abs(y1 - y0),
    })) this.clipBox.setAttribute(key, value);
    this.body.setAttribute("clip-path", this.clipName);
  }
}

/* The items of each mark; letters that do not follow each other are marked one by one. */
function groupsOf(frame) {
  const groups = [];
  for (const { has, isFrame, opacity } of frame.marks || []) {
    let items = null;
    for (const item of frame.items) {
      if (!has(item)) items = null;
      else if (items) items.push(item);
      else groups.push({ items: (items = [item]), isFrame, opacity });
    }
  }
  return groups;
}

/* Where an item stands on the page, and where its strands meet; it `isAway` on the way back. */
function centreOf(item, frame, annulus) {
  const isCell = !item.walks;
  const position = isCell ? Math.abs(item.letter) - 0.5 : item.low + (item.count - 1) / 2;
  const middle = item.y + (item.rows * M.levelHeight) / 2;
  const meeting = isCell && item.curves ? pointOfCubic(item.curves[0], item.time) : [0, 0];
  const shift = annulus ? shiftOf(frame, annulus, item) : 0;
  if (isCell && frame.kink && item.kink) {
    const axis = (Math.abs(item.letter) - 1) * M.strandSpacing;
    meeting[0] = axis + item.kink.amplitude * (meeting[0] - axis);
  }
  if (shift === null) {
    const [x, y] = annulus.onPage(position, middle);
    return { x, y, meeting: annulus.onPage(meeting[0] / M.strandSpacing, meeting[1]), isAway: true };
  }
  return {
    x: position * M.strandSpacing, y: middle + shift, meeting: [meeting[0], meeting[1] + shift],
  };
}

/* The room that a frame takes, with its margins: left, top, right, bottom on the page. */
function boxOf(frame, { isClosed, isRight }) {
  const outwards = frame.last * frame.returnSpacing;
  const rise = isClosed ? M.closingGap / 2 + outwards : 0;
  const reach = isClosed ? M.closingGap + outwards + M.margin : NUMBER_ROOM;
  const left = isClosed ? -NUMBER_ROOM : -M.margin;
  const top = -(isClosed ? rise + M.margin : NUMBER_ROOM);
  const right = frame.last * M.strandSpacing + reach, bottom = frame.height + rise + M.margin;
  return isRight ? [top, -right, bottom, -left] : [left, top, right, bottom];
}
