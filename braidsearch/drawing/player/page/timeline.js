/* A proof in time: lanes of stages and parts, and the stops at which a viewer rests. */

/* A chain of steps from one braid. Its states stand at the boundaries of its parts. */
class Lane {
  constructor(data) {
    this.name = data.name;
    this.goal = data.goal;
    this.parts = [];
    this.stepOfPart = [];
    this.stepEnds = [0]; // the boundary at which each step begins, and then where the last ends
    this.steps = data.steps;
    this.states = [{
      word: data.start.word, strands: data.start.strands, components: data.start.components,
    }];
    data.steps.forEach((step, number) => {
      for (const part of step.parts) {
        const state = this.states[this.states.length - 1];
        this.states.push(applyPart(state, part));
        this.parts.push(part);
        this.stepOfPart.push(number);
      }
      this.stepEnds.push(this.parts.length);
    });
    this.stages = new Map();
    this.movements = new Map();
  }

  /* The stage at a boundary: between two steps marked with what the whole steps change. */
  stage(boundary) {
    let found = this.stages.get(boundary);
    if (!found) {
      const state = this.states[boundary];
      const [acted, made] = this.spans(boundary, state.word);
      found = stageOf(state, acted, made);
      this.stages.set(boundary, found);
    }
    return found;
  }

  /* What the braid at a boundary is called: the ends of a proof have names. */
  nameAt(boundary) {
    if (boundary === 0 || !this.goal) return this.name;
    return boundary === this.parts.length ? this.goal : `from ${this.name}`;
  }

  isStepEnd(boundary) {
    return boundary === 0 || boundary === this.parts.length
      || this.stepOfPart[boundary] !== this.stepOfPart[boundary - 1];
  }

  spans(boundary, word) {
    const next = this.parts[boundary], last = this.parts[boundary - 1];
    if (!this.isStepEnd(boundary)) return [actedSpans(next, word), madeSpans(last, word)];
    const before = last && this.steps[this.stepOfPart[boundary - 1]];
    const after = next && this.steps[this.stepOfPart[boundary]];
    return [after ? [after.acted] : [], before ? [before.made] : []];
  }

  movement(part) {
    let found = this.movements.get(part);
    if (!found) {
      if (this.movements.size > 400) this.movements.clear();
      found = movementsOf(this.stage(part), this.parts[part], this.stage(part + 1));
      this.movements.set(part, found);
    }
    return found;
  }

  /* How long the parts from one boundary to another take, at the usual speed. */
  secondsOf(start, end) {
    let sum = 0;
    for (let part = start; part < end; part += 1) sum += this.movement(part).seconds;
    return sum;
  }

  /* The frame on the way between two boundaries, at a time from 0 to 1, with its marks. */
  frameBetween(start, end, time, isClosed) {
    if (start === end || time <= 0) return this.restFrame(start);
    if (time >= 1) return this.restFrame(end);
    let at = time * this.secondsOf(start, end), part = start;
    while (part < end - 1 && at > this.movement(part).seconds) at -= this.movement(part++).seconds;
    const movements = this.movement(part);
    const share = movements.seconds ? Math.min(1, at / movements.seconds) : 1;
    const frame = frameOfPart(movements, share, isClosed);
    const before = part === start ? Math.max(0, 1 - 5 * share) : 0;
    const after = part === end - 1 ? Math.max(0, 5 * share - 4) : 0;
    frame.marks = [
      ...this.restMarks(part, "was", before), ...this.restMarks(part + 1, "becomes", after),
      { has: (item) => item.active, opacity: 1 - Math.max(before, after) },
    ];
    frame.part = part;
    return frame;
  }

  restFrame(boundary) {
    const frame = frameOfStage(this.stage(boundary));
    frame.marks = this.restMarks(boundary, "was", 1);
    return frame;
  }

  restMarks(boundary, key, opacity) {
    if (!opacity) return [];
    const { acted, made } = this.stage(boundary);
    const mark = (isFrame) => ([first, last]) => ({
      has: (item) => item[key] >= first && item[key] < last && item[key] !== null,
      isFrame, opacity,
    });
    return [...acted.map(mark(false)), ...made.map(mark(true))];
  }
}

/* The stops of a proof: in each scene first as it begins, then after each step of each lane.
   With `isSingle` after each part of a step. */
function stopsOf(scenes, isSingle) {
  const stops = [];
  let steps = 0;
  scenes.forEach((scene, number) => {
    const boundaries = scene.lanes.map(() => 0);
    stops.push({ scene: number, boundaries: [...boundaries], step: null, steps });
    scene.lanes.forEach((lane, which) => {
      for (let boundary = 1; boundary <= lane.parts.length; boundary += 1) {
        const isEnd = lane.isStepEnd(boundary);
        if (!isEnd && !isSingle) continue;
        boundaries[which] = boundary;
        stops.push({
          scene: number,
          boundaries: [...boundaries],
          lane: which,
          step: steps + lane.stepOfPart[boundary - 1],
          isEnd,
        });
      }
      steps += lane.steps.length;
    });
  });
  return stops;
}
