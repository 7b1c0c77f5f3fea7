/* A lane on the page: its picture, fitted to its paper. */

/* A picture that would be smaller than the smallest is scrolled instead. */
const SMALLEST_SCALE = 0.46, SCROLL_BAR = 16, SCROLLED_SCALE = 1, LARGEST_SCALE = 1.7;

/* Below the first scale letters are written larger, as far as the strands leave room for them: for
   a sign and one digit, or, on many strands, for two digits. */
const LETTERS_AS_THEY_ARE = 0.9, MOST_ENLARGED = 1.6, MOST_ENLARGED_WIDE = 1.25;

const enlargement = (scale, strands) => rounded(Math.max(1, Math.min(
  LETTERS_AS_THEY_ARE / scale, strands > 9 ? MOST_ENLARGED_WIDE : MOST_ENLARGED,
)));

/* One lane on the page: its picture, its scrolling paper, the caption. */
class LaneView {
  constructor(lane, holder) {
    this.lane = lane;
    const figure = document.createElement("figure");
    figure.className = "lane";
    this.paper = document.createElement("div");
    this.paper.className = "paper";
    this.note = document.createElement("p");
    this.note.className = "note";
    this.caption = document.createElement("figcaption");
    this.heading = document.createElement("span");
    this.heading.className = "word";
    this.caption.append(this.heading);
    figure.append(this.paper, this.note, this.caption);
    holder.append(figure);
    this.picture = new Picture(this.paper);
    this.extents = new Map();
  }

  /* The room that the largest stage takes. */
  largest(view) {
    const key = `${view.isClosed} ${view.isRight}`;
    if (!this.extents.has(key)) {
      let most = null;
      this.lane.states.forEach((state, boundary) => {
        if (!isDrawn(state)) return;
        const { count } = arrangeRows(state.word, new Set());
        const box = boxOf(frameOf(state, [], heightOf(count + 1)), view);
        const size = [box[2] - box[0], box[3] - box[1]];
        most = most ? [Math.max(most[0], size[0]), Math.max(most[1], size[1])] : size;
      });
      this.extents.set(key, most || [1, 1]);
    }
    return this.extents.get(key);
  }

  /* Draw the lane between two boundaries; the paper is as large as it needs to be. */
  draw(start, end, time, view, room) {
    const { lane } = this, places = [start, end].map((boundary) => lane.states[boundary]);
    const isShown = places.every(isDrawn);
    const still = time < 0.5 ? start : end;
    this.picture.svg.toggleAttribute("hidden", !isShown && !isDrawn(lane.states[still]));
    this.note.hidden = isDrawn(lane.states[still]);
    if (!this.note.hidden) {
      this.note.textContent = "This braid is too large for a picture.";
      return;
    }
    const frame = isShown ? lane.frameBetween(start, end, time, view.isClosed) : lane.restFrame(still);
    let box = boxOf(frame, view);
    if (frame.fading) {
      const other = boxOf(frame.fading.other, view), share = frame.fading.share;
      box = box.map((value, side) => between(value, other[side], share));
      this.note.hidden = false;
      this.note.textContent = "rewritten by braid relations, too many to be shown one by one";
    }
    const scale = this.scaleOf(box, view, room);
    this.picture.enlarge(enlargement(scale, frame.strands));
    this.picture.draw(frame, view);
    this.fit(box, scale, room);
  }

  scaleOf(box, view, room) {
    const [width, height] = [box[2] - box[0], box[3] - box[1]];
    const most = this.largest(view), fitting = ([w, h]) => Math.min(room.width / w, room.height / h);
    let scale = Math.min(LARGEST_SCALE, fitting(most));
    if (scale < SMALLEST_SCALE) {
      const across = view.isRight
        ? (room.height - SCROLL_BAR) / height : (room.width - SCROLL_BAR) / width;
      scale = Math.min(LARGEST_SCALE, fitting([width, height]));
      scale = Math.max(scale, Math.min(SCROLLED_SCALE, Math.max(SMALLEST_SCALE, across)));
    }
    return scale;
  }

  fit(box, scale, room) {
    const [width, height] = [box[2] - box[0], box[3] - box[1]];
    const shown = [Math.max(room.width, width * scale), Math.max(room.height, height * scale)];
    const { svg } = this.picture, [w, h] = shown.map((value) => value / scale);
    const left = box[0] - (w - width) / 2, top = box[1] - (h - height) / 2;
    const values = [left, top, w, h].map(rounded).join(" ");
    const sizes = shown.map((value) => `${Math.floor(value)}`);
    if (values === this.values && sizes.join() === this.sizes) return;
    this.values = values;
    svg.setAttribute("viewBox", values);
    if (sizes.join() !== this.sizes) {
      this.sizes = sizes.join();
      svg.setAttribute("width", sizes[0]);
      svg.setAttribute("height", sizes[1]);
    }
    this.scale = scale;
    this.origin = [left, top];
    this.isScrolling = shown[0] > room.width + 1 || shown[1] > room.height + 1;
    this.paper.tabIndex = this.isScrolling ? 0 : -1;
  }

  /* Scroll to what is marked, where the picture is larger than its paper: a little with each frame
     ("gliding"), or as a browser does it ("smooth", "instant"). */
  follow(way) {
    if (!this.isScrolling) return;
    const box = this.picture.body.querySelector("rect:not([display])");
    if (!box) return;
    const at = (axis, size) => Number(box.getAttribute(axis)) + Number(box.getAttribute(size)) / 2;
    const goal = [
      (at("x", "width") - this.origin[0]) * this.scale - this.paper.clientWidth / 2,
      (at("y", "height") - this.origin[1]) * this.scale - this.paper.clientHeight / 2,
    ];
    if (way === "gliding") {
      this.paper.scrollLeft += (goal[0] - this.paper.scrollLeft) * 0.08;
      this.paper.scrollTop += (goal[1] - this.paper.scrollTop) * 0.08;
    } else {
      this.paper.scrollTo({ left: goal[0], top: goal[1], behavior: way });
    }
  }
}

const isDrawn = (state) => (
  state.word.length <= M.mostCrossings && state.strands <= M.mostStrands
);
