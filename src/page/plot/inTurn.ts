/** Things that take some time to draw, one in a task each, so that the page stays awake while many are drawn at once. */

const waiting: (() => void)[] = [];
let isDue = false;

function next(): void {
  const draw = waiting.shift();
  isDue = waiting.length > 0;
  // Set first, so that one that fails does not hold up the others.
  if (isDue) setTimeout(next, 0);
  draw?.();
}

/** Draws when its turn has come; the answer calls it off. */
export function inTurn(draw: () => void): () => void {
  waiting.push(draw);
  if (!isDue) {
    isDue = true;
    setTimeout(next, 0);
  }
  return () => {
    const place = waiting.indexOf(draw);
    if (place >= 0) waiting.splice(place, 1);
  };
}
