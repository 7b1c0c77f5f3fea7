/* Words, their levels, and what one part of a proof makes of a word. */

/* The row of each letter: a letter stands beside the one before it where its index is larger by at
   least two and no break stands between them, as in the Python module on levels. */
function arrangeRows(word, breaks) {
  const rows = [];
  let row = -1;
  word.forEach((letter, number) => {
    const isBeside = number > 0 && !breaks.has(number)
      && Math.abs(letter) >= Math.abs(word[number - 1]) + 2;
    if (!isBeside) row += 1;
    rows.push(row);
  });
  return { rows, count: row + 1 };
}

const heightOf = (count) => 2 * M.lead + M.levelHeight * count;

/* The letters of a word as cells of a picture: `y` is the top of a cell, `rows` its length. */
const cellsOf = (word, layout) => word.map((letter, number) => ({
  letter, number, rows: 1, y: M.lead + M.levelHeight * layout.rows[number],
}));

const returnSpacingOf = (strands) => M.returnSpacings[strands];

/* The word after a part, without its marks. */
function applyPart(state, part) {
  const { word, strands, components } = state;
  switch (part[0]) {
    case "relation": {
      const [, at, before, after] = part;
      return {
        ...state, word: [...word.slice(0, at), ...after, ...word.slice(at + before.length)],
      };
    }
    case "turn": {
      const turn = part[1] > 0 ? part[1] : word.length + part[1];
      const front = word.slice(0, turn);
      return {
        ...state,
        word: [...word.slice(turn), ...front],
        components: permuted(components, front),
      };
    }
    case "conjugation":
      return {
        ...state, word: [-part[1], ...word, part[1]], components: permuted(components, [part[1]]),
      };
    case "stabilization":
      return {
        word: [...word, part[1]],
        strands: strands + 1,
        components: [...components, components[strands - 1]],
      };
    case "destabilization":
      return {
        word: word.slice(0, -1), strands: strands - 1, components: components.slice(0, -1),
      };
    case "stay":
      return { ...state, components: part[1] };
    default: // "rewriting": the whole word anew
      return { ...state, word: part[1], components: part[2] };
  }
}

/* The components of the positions below some letters. */
function permuted(components, letters) {
  const found = [...components];
  for (const letter of letters) {
    const left = Math.abs(letter) - 1;
    [found[left], found[left + 1]] = [found[left + 1], found[left]];
  }
  return found;
}

/* The letters that a part acts on, in the word before it: spans from a letter up to another. */
function actedSpans(part, word) {
  const length = word.length;
  switch (part[0]) {
    case "relation": return [[part[1], part[1] + part[2].length]];
    case "turn": return [part[1] > 0 ? [0, part[1]] : [length + part[1], length]];
    case "destabilization": return [[length - 1, length]];
    default: return [];
  }
}

/* The letters that a part has made, in the word after it. */
function madeSpans(part, word) {
  const length = word.length;
  switch (part[0]) {
    case "relation": return [[part[1], part[1] + part[3].length]];
    case "turn": return [part[1] > 0 ? [length - part[1], length] : [0, -part[1]]];
    case "conjugation": return [[0, 1], [length - 1, length]];
    case "stabilization": return [[length - 1, length]];
    default: return [];
  }
}

const isNotEmpty = ([first, last]) => last > first;

/* A state between two parts, at rest: its word, where its letters stand, what is marked. */
function stageOf(state, acted, made) {
  const breaks = new Set([...acted, ...made].flat());
  const layout = arrangeRows(state.word, breaks);
  return {
    ...state,
    acted: acted.filter(isNotEmpty),
    made: made.filter(isNotEmpty),
    breaks,
    layout,
    cells: cellsOf(state.word, layout),
    height: heightOf(layout.count),
  };
}
