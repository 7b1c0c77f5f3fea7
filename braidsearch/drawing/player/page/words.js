/* Words of braids, and movements in words. */

/* The word with what comes next behind a band and what was made within a frame. */
function markedWord(word, acted, made) {
  if (!word.length) return ["(empty)"];
  const shown = word.length > 400 ? [...word.slice(0, 400)] : word, nodes = [];
  const within = (spans, k) => spans.some(([first, last]) => k >= first && k < last);
  for (let k = 0; k < shown.length;) {
    const isActed = within(acted, k), isMade = within(made, k);
    let end = k;
    while (end < shown.length && within(acted, end) === isActed && within(made, end) === isMade) end += 1;
    const piece = document.createElement(isActed || isMade ? "mark" : "span");
    piece.textContent = shown.slice(k, end).join(" ").replaceAll("-", "\u2212");
    if (isMade) piece.classList.add("is-made");
    if (isActed) piece.classList.add("is-acted");
    nodes.push(piece, " ");
    k = end;
  }
  if (shown.length < word.length) nodes.push(`... ${word.length} letters`);
  return nodes;
}

/* One movement in words. */
function partText(part) {
  const letters = (word) => word.join(" ");
  switch (part[0]) {
    case "relation": {
      const [, at, taken, put] = part, last = at + Math.max(taken.length, put.length);
      const places = `letters ${at + 1} to ${last}`;
      if (!put.length) return `cancellation: ${letters(taken)}, ${places}, taken out.`;
      if (!taken.length) return `insertion: ${letters(put)}, ${places}, put in.`;
      const kind = taken.length === 2 ? "far commutation" : "braid relation";
      return `${kind}: ${letters(taken)}, ${places}, becomes ${letters(put)}.`;
    }
    case "turn": {
      const count = Math.abs(part[1]), noun = count === 1 ? "letter" : `${count} letters`;
      return part[1] > 0
        ? `the first ${noun} around the closure to the end.`
        : `the last ${noun} around the closure to the front.`;
    }
    case "conjugation": return `conjugation by ${part[1]}: its inverse in front, itself behind.`;
    case "stabilization": return `a new strand with the letter ${part[1]}.`;
    case "destabilization": return `the last strand goes with the letter ${part[1]}.`;
    case "stay": return "the word stays as it is.";
    default: return "rewritten by braid relations.";
  }
}
