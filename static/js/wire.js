// Drawing a wire. Three ways in: press on a pin and drag; click a pin and click on; or from the keyboard at the cursor.
// A wire is idle until it has a beginning, runs while it follows the pointer, and ends on a pin, on a wire, or by a
// double click where nothing is.
import { joinsAt, overlay, svg, userX, userY } from './grid.js';
import { obstacles } from './obstacles.js';
import { route } from './route.js';
import { send } from './queue.js';

const preview = svg('path', { class: 'wire-preview', hidden: '' });
overlay.append(preview);

let fixed = null;   // places fixed so far; the last one is where the running stretch begins
let running = [];   // the stretch from there to the pointer
let upright = false;
let target = null;

/** Whether a wire is being drawn. */
export const drawing = () => fixed !== null;

/** Begins a wire at a grid place. */
export function begin(place) {
  fixed = [place];
  target = place;
  follow(place);
}

/** Leads the running stretch to a place. */
export function follow(place) {
  target = place;
  const from = fixed[fixed.length - 1];
  running = route(from, place, obstacles([from, place]), upright);
  show();
}

/** Flips the bend of the running stretch. */
export function bend() {
  upright = !upright;
  follow(target);
}

/** Fixes a corner at a place, or ends the wire when something is there to join. @returns {boolean} whether it ended */
export function click(place) {
  follow(place);
  const start = fixed[0];
  if (place[0] === start[0] && place[1] === start[1]) return false;
  if (joinsAt(place)) {
    end();
    return true;
  }
  fixed = [...fixed, ...running.slice(1)];
  follow(place);
  return false;
}

/** Ends the wire where it is. */
export async function end() {
  const points = tidy([...fixed, ...running.slice(1)]);
  fixed = null;
  const keep = preview.getAttribute('d');
  if (points.length > 1) {
    await send([{ do: 'wire', points }]);
  }
  if (!drawing() && preview.getAttribute('d') === keep) hide();
}

/** Gives the wire up. */
export function cancel() {
  fixed = null;
  hide();
}

function hide() {
  preview.setAttribute('hidden', '');
}

function show() {
  const points = [...fixed, ...running.slice(1)];
  preview.setAttribute('d', 'M' + points.map(([x, y]) => `${userX(x)} ${userY(y)}`).join('L'));
  preview.removeAttribute('hidden');
}

// Corners only: places that lie on the straight between their neighbours go.
function tidy(points) {
  const distinct = points.filter((p, i) => i === 0 || p[0] !== points[i - 1][0] || p[1] !== points[i - 1][1]);
  return distinct.filter((p, i) => {
    const a = distinct[i - 1], b = distinct[i + 1];
    return !a || !b || !((a[0] === p[0] && p[0] === b[0]) || (a[1] === p[1] && p[1] === b[1]));
  });
}
