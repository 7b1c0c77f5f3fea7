/* The player: where it stands, how it moves on, and what it says. */

const LONGEST_STEP = 7, REST = 1.1; // seconds, at the usual speed

const prefersStillness = window.matchMedia("(prefers-reduced-motion: reduce)");

class Player {
  constructor(proof) {
    this.scenes = proof.scenes.map((scene) => ({
      ...scene, lanes: scene.lanes.map((lane) => new Lane(lane)),
    }));
    this.reasons = proof.reasons;
    this.items = document.querySelectorAll("li.step");
    this.elements = Object.fromEntries([...document.querySelectorAll("[id]")]
      .map((element) => [element.id, element]));
    this.views = [];
    this.at = 0;
    this.goal = 0;
    this.time = 0;
    this.isPlaying = false;
    this.speed = 1;
    this.view = { isClosed: false, isRight: false, hasLetters: true };
    this.stops = stopsOf(this.scenes, false);
    this.elements.telling.append(...document.querySelectorAll(".evidence"));
    this.connect();
    this.settle();
    window.addEventListener("resize", () => this.measure());
    this.measure();
    this.chooseDirection();
    this.redraw();
    this.tell();
  }

  connect() {
    const on = (id, event, action) => this.elements[id].addEventListener(event, action);
    on("first", "click", () => this.jump(0));
    on("back", "click", () => this.step(-1));
    on("play", "click", () => this.play(!this.isPlaying));
    on("forward", "click", () => this.step(1));
    on("last", "click", () => this.jump(this.stops.length - 1));
    on("slider", "input", () => this.jump(Number(this.elements.slider.value)));
    on("speed", "change", () => { this.speed = Number(this.elements.speed.value); });
    on("closure", "change", ({ target }) => this.look({ isClosed: target.checked }));
    on("letters", "change", ({ target }) => this.look({ hasLetters: target.checked }));
    on("sideways", "change", ({ target }) => this.look({ isRight: target.checked }));
    on("single", "change", ({ target }) => this.setSingle(target.checked));
    document.addEventListener("keydown", (event) => this.press(event));
  }

  /* Keys work everywhere but where an element has its own use for them. */
  press(event) {
    if (event.ctrlKey || event.altKey || event.metaKey) return;
    const { target, key } = event, kind = target.tagName;
    const isField = kind === "SELECT" || (kind === "INPUT" && target.type === "range");
    const isButton = ["BUTTON", "INPUT", "SUMMARY", "A"].includes(kind);
    if (isField || (key === " " && isButton)) return;
    const actions = {
      ArrowRight: () => this.step(1),
      ArrowLeft: () => this.step(-1),
      Home: () => this.jump(0),
      End: () => this.jump(this.stops.length - 1),
      " ": () => this.play(!this.isPlaying),
      c: () => this.elements.closure.click(),
      l: () => this.elements.letters.click(),
      r: () => this.elements.single.click(),
      t: () => this.elements.sideways.click(),
    };
    if (!actions[key]) return;
    event.preventDefault();
    actions[key]();
  }

  look(change) {
    Object.assign(this.view, change);
    this.redraw();
  }

  setSingle(isSingle) {
    const { scene, boundaries } = this.stops[this.goal];
    this.stops = stopsOf(this.scenes, isSingle);
    const sum = (each) => each.boundaries.reduce((total, value) => total + value, 0);
    const wanted = boundaries.reduce((total, value) => total + value, 0);
    this.jump(this.stops.findIndex((stop) => stop.scene === scene && sum(stop) >= wanted));
  }

  /* Whether the picture runs downwards or to the right: as it is larger. */
  chooseDirection() {
    const scaleOf = (isRight) => Math.min(...this.views.map((laneView) => {
      const [width, height] = laneView.largest({ ...this.view, isRight });
      return Math.min(LARGEST_SCALE, this.room.width / width, this.room.height / height);
    }));
    this.view.isRight = scaleOf(true) > 1.1 * scaleOf(false);
    this.elements.sideways.checked = this.view.isRight;
  }

  measure() {
    const half = this.elements.stage.clientWidth / 2;
    const isBeside = this.views.length > 1 && (half > 260 || this.views.every((laneView) => (
      laneView.largest({ isClosed: true, isRight: false })[0] * SMALLEST_SCALE < half
    )));
    this.elements.stage.classList.toggle("is-beside", isBeside);
    const paper = this.views[0].paper;
    this.room = { width: paper.clientWidth, height: paper.clientHeight };
    if (this.view) this.redraw();
  }

  /* Show the lanes of the scene of a stop. */
  settle() {
    const { scene } = this.stops[this.at];
    if (this.scene === scene) return;
    this.scene = scene;
    this.elements.stage.replaceChildren();
    this.views = this.scenes[scene].lanes.map((lane) => new LaneView(lane, this.elements.stage));
    document.querySelectorAll(".evidence").forEach((section, number) => {
      section.hidden = number !== scene;
    });
    this.measure();
  }

  jump(stop) {
    this.play(false);
    this.arrive(Math.max(0, Math.min(this.stops.length - 1, stop)), "instant");
  }

  arrive(stop, way = prefersStillness.matches ? "instant" : "smooth") {
    this.at = stop;
    this.goal = stop;
    this.time = 0;
    this.settle();
    this.redraw();
    this.views.forEach((laneView) => laneView.follow(way));
    this.tell();
  }

  step(way) {
    this.play(false);
    this.go(way);
  }

  go(way) {
    if (this.goal !== this.at) this.arrive(this.goal);
    const goal = this.at + way;
    if (goal < 0 || goal >= this.stops.length) return;
    if (prefersStillness.matches || this.stops[goal].scene !== this.stops[this.at].scene) {
      this.arrive(goal);
      return;
    }
    this.goal = goal;
    this.time = 0;
    this.seconds = this.secondsOf(this.at, goal);
    this.tell();
    this.run();
  }

  secondsOf(one, other) {
    const first = this.stops[Math.min(one, other)], second = this.stops[Math.max(one, other)];
    const sum = this.views.reduce((total, { lane }, which) => (
      total + lane.secondsOf(first.boundaries[which], second.boundaries[which])
    ), 0);
    return Math.min(LONGEST_STEP, sum) || 0.2;
  }

  play(isPlaying) {
    if (isPlaying === this.isPlaying) return;
    this.isPlaying = isPlaying;
    const { play } = this.elements;
    play.classList.toggle("is-playing", isPlaying);
    play.setAttribute("aria-label", isPlaying ? "Pause" : "Play");
    play.title = isPlaying ? "Pause (space)" : "Play (space)";
    this.rest = 0;
    if (!isPlaying) return;
    if (this.goal === this.at && this.at === this.stops.length - 1) this.arrive(0);
    this.run();
  }

  run() {
    if (this.isRunning) return;
    this.isRunning = true;
    this.before = null;
    requestAnimationFrame((now) => this.tick(now));
  }

  /* One frame of the screen. */
  tick(now) {
    const passed = this.before === null ? 0 : Math.min(0.1, (now - this.before) / 1000) * this.speed;
    this.before = now;
    if (this.goal !== this.at) {
      this.time += passed / this.seconds;
      if (this.time >= 1) this.arrive(this.goal);
      else this.redraw(true);
    } else if (this.isPlaying) {
      this.rest += passed;
      if (this.rest > REST) {
        this.rest = 0;
        if (this.at === this.stops.length - 1) this.play(false);
        else this.go(1);
      }
    }
    this.isRunning = this.goal !== this.at || this.isPlaying;
    if (this.isRunning) requestAnimationFrame((later) => this.tick(later));
  }

  redraw(isMoving = false) {
    if (!this.room) return;
    const isBack = this.goal < this.at;
    const first = this.stops[isBack ? this.goal : this.at];
    const second = this.stops[isBack ? this.at : this.goal];
    const time = isBack ? 1 - this.time : this.time;
    this.views.forEach((laneView, which) => {
      const [start, end] = [first.boundaries[which], second.boundaries[which]];
      if (isMoving && start === end) return;
      laneView.draw(start, end, time, this.view, this.room);
      if (isMoving) laneView.follow("gliding");
    });
  }

  /* The step in words, beside the picture and for those who hear it. */
  tell() {
    const number = this.goal, stop = this.stops[number], { elements } = this;
    const isStart = stop.step === null, item = isStart ? null : this.items[stop.step];
    const scene = this.scenes[stop.scene];
    const heading = isStart ? scene.title : `Step ${stop.step + 1} of ${this.items.length}`;
    elements.heading.textContent = heading;
    elements.text.replaceChildren(...(item
      ? [...item.childNodes].map((node) => node.cloneNode(true)) : [scene.opening]));
    elements.relation.textContent = item ? this.relationText(stop) : "";
    const { kind } = item ? this.stepOf(stop) : {};
    const isLast = number === this.stops.length - 1;
    elements.reason.textContent = [this.reasons[kind], isLast && scene.closing]
      .filter(Boolean).join(" ");
    this.current?.removeAttribute("aria-current");
    if (item) item.setAttribute("aria-current", "step");
    this.current = item;
    const { slider } = elements;
    slider.max = this.stops.length - 1;
    slider.value = number;
    slider.setAttribute("aria-valuetext", `${heading}: ${elements.text.textContent}`);
    elements.place.textContent = `${number} / ${this.stops.length - 1}`;
    for (const [id, isAtEnd] of [["first", number === 0], ["back", number === 0],
      ["forward", isLast], ["last", isLast]]) {
      elements[id].setAttribute("aria-disabled", isAtEnd);
    }
    this.views.forEach((laneView, which) => this.describe(laneView, stop.boundaries[which]));
  }

  stepOf(stop) {
    const lane = this.scenes[stop.scene].lanes[stop.lane];
    return lane.steps[lane.stepOfPart[stop.boundaries[stop.lane] - 1]];
  }

  /* The relation that a stop inside a step, or at its end, has just come through. */
  relationText(stop) {
    const lane = this.scenes[stop.scene].lanes[stop.lane];
    const parts = this.stepOf(stop).parts.length;
    if (!this.elements.single.checked) {
      return parts > 1 ? `Shown as ${parts} movements; single relations make each a stop.` : "";
    }
    const boundary = stop.boundaries[stop.lane];
    const number = boundary - lane.stepEnds[lane.stepOfPart[boundary - 1]];
    return parts > 1
      ? `${number} of ${parts}: ${partText(lane.parts[boundary - 1])}` : "";
  }

  describe({ lane, picture, heading }, boundary) {
    const { word, strands, acted, made } = lane.stage(boundary);
    const text = word.join(" ") || "no letters";
    const name = lane.nameAt(boundary);
    picture.title.textContent = `${this.view.isClosed ? "Closure of the braid" : "Braid"} `
      + `${name}: ${strands} ${strands === 1 ? "strand" : "strands"}, `
      + `${word.length} ${word.length === 1 ? "letter" : "letters"}`;
    picture.description.textContent = `Word: ${text.slice(0, 2000)}.`;
    heading.replaceChildren(`${name}  ${strands}: `, ...markedWord(word, acted, made));
  }
}

document.documentElement.classList.add("is-live");
new Player(PROOF);
