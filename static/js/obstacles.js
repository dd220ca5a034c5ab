// What stands in the way of a new wire, read from the drawing.
import { liesOn, pins, stretches, sheet, step, userX, userY } from './grid.js';

/**
 * @param {number[][]} meant places that the wire is meant to join
 * @returns {import('./route.js').Obstacles}
 */
export function obstacles(meant) {
  const wanted = new Set(meant.map(String));
  const joins = new Set();
  for (const pin of pins()) joins.add(String(pin.at));
  const level = new Set(), upright = new Set();
  for (const stretch of stretches()) {
    joins.add(String(stretch.from)).add(String(stretch.to));
    eachPlace(stretch, (place, axis) => (axis === 0 ? level : upright).add(String(place)));
  }
  for (const place of wanted) joins.delete(place);
  const bodies = [...sheet.querySelectorAll('[data-part] .hit')].map(hit => hit.getBBox());
  return {
    joins: (x, y) => joins.has(x + ',' + y),
    along: (x, y, direction) => (direction === 0 ? level : upright).has(x + ',' + y) && !wanted.has(x + ',' + y),
    covered: (x, y) => bodies.some(box => inside(box, userX(x), userY(y), -step / 8)),
    close: (x, y) => bodies.some(box => inside(box, userX(x), userY(y), step)),
  };
}

const inside = (box, x, y, margin) =>
  x > box.x - margin && x < box.x + box.width + margin && y > box.y - margin && y < box.y + box.height + margin;

function eachPlace({ from, to }, visit) {
  const axis = from[1] === to[1] ? 0 : 1;
  const dx = Math.sign(to[0] - from[0]), dy = Math.sign(to[1] - from[1]);
  for (let [x, y] = from; ; x += dx, y += dy) {
    visit([x, y], axis);
    if (x === to[0] && y === to[1]) return;
  }
}

/** Whether a place lies on any wire. */
export const onWire = place => stretches().some(stretch => liesOn(place, stretch));
