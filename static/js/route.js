// The way of a wire: from one place to another along the grid, with few corners, round parts and past pins that it is
// not meant to join. Plain data in, plain data out; nothing here touches the page.

const steps = [[1, 0], [0, 1], [-1, 0], [0, -1]];
const corner = 3;    // what a corner costs, in steps
const crossing = 2;  // what crossing another wire costs
const body = 12;     // what a step across a part costs
const near = 0.4;    // what a step close by a part costs
const margin = 4;    // how far round both ends the way may swing, at least

/**
 * @typedef {object} Obstacles
 * @property {(x: number, y: number) => boolean} joins whether a wire that bends, ends or passes here would join something
 * @property {(x: number, y: number, direction: number) => boolean} along whether a wire lies here in that direction (0 level, 1 upright)
 * @property {(x: number, y: number) => boolean} covered whether a part covers the place
 * @property {(x: number, y: number) => boolean} close whether a part lies close by
 */

/**
 * The cheapest square way between two places by Dijkstra's method over (place, direction).
 * @param {number[]} from @param {number[]} to @param {Obstacles} obstacles
 * @param {boolean} upright start upright rather than level, when both cost the same
 * @returns {number[][]} corner points, both ends included
 */
export function route(from, to, obstacles, upright = false) {
  if (from[0] === to[0] && from[1] === to[1]) return [from];
  const area = bounds(from, to);
  const best = new Map();
  const queue = new Queue();
  for (let direction = 0; direction < 4; direction++) {
    const tie = (direction % 2 === 1) === upright ? 0 : 0.5;
    queue.push(tie, { x: from[0], y: from[1], direction, before: null });
  }
  for (let node; (node = queue.pop());) {
    const key = node.value.x + ',' + node.value.y + ',' + node.value.direction;
    if (best.has(key)) continue;
    best.set(key, true);
    if (node.value.x === to[0] && node.value.y === to[1]) return corners(node.value);
    spread(node, to, area, obstacles, queue);
  }
  return straight(from, to, upright);
}

/** A way of at most one corner, whatever lies there. */
export function straight(from, to, upright) {
  if (from[0] === to[0] || from[1] === to[1]) return [from, to];
  return [from, upright ? [from[0], to[1]] : [to[0], from[1]], to];
}

function spread({ cost, value }, to, area, obstacles, queue) {
  for (let direction = 0; direction < 4; direction++) {
    if ((direction + 2) % 4 === value.direction && value.before) continue;
    if (!value.before && direction !== value.direction) continue;
    const x = value.x + steps[direction][0], y = value.y + steps[direction][1];
    if (x < area.left || x > area.right || y < area.top || y > area.bottom) continue;
    const last = x === to[0] && y === to[1];
    const turned = direction !== value.direction;
    const price = stepPrice(x, y, direction % 2, last, obstacles) + (turned ? corner + bendPrice(value, obstacles) : 0);
    if (price < Infinity) queue.push(cost + price, { x, y, direction, before: value });
  }
}

function stepPrice(x, y, axis, last, obstacles) {
  if (last) return 1;
  if (obstacles.along(x, y, axis)) return Infinity;
  if (obstacles.joins(x, y)) return Infinity;
  return 1 + (obstacles.along(x, y, 1 - axis) ? crossing : 0) + (obstacles.covered(x, y) ? body : obstacles.close(x, y) ? near : 0);
}

// A corner on another wire would join it.
const bendPrice = ({ x, y }, obstacles) => obstacles.along(x, y, 0) || obstacles.along(x, y, 1) ? Infinity : 0;

function bounds(from, to) {
  const swing = margin + Math.round((Math.abs(from[0] - to[0]) + Math.abs(from[1] - to[1])) / 4);
  return {
    left: Math.min(from[0], to[0]) - swing, right: Math.max(from[0], to[0]) + swing,
    top: Math.min(from[1], to[1]) - swing, bottom: Math.max(from[1], to[1]) + swing,
  };
}

function corners(last) {
  const points = [[last.x, last.y]];
  for (let node = last; node.before; node = node.before) {
    const before = node.before;
    if (!before.before || before.direction !== node.direction) points.push([before.x, before.y]);
  }
  return points.reverse();
}

// A binary heap; equal costs leave in the order in which they came, so that the same drawing gives the same way.
class Queue {
  items = [];
  count = 0;
  push(cost, value) {
    const items = this.items, item = { cost, order: this.count++, value };
    let i = items.push(item) - 1;
    for (let up; i > 0 && less(item, items[up = (i - 1) >> 1]); i = up) items[i] = items[up];
    items[i] = item;
  }
  pop() {
    const items = this.items, top = items[0], item = items.pop();
    if (items.length === 0) return top;
    let i = 0;
    for (let child; (child = 2 * i + 1) < items.length; i = child) {
      if (child + 1 < items.length && less(items[child + 1], items[child])) child++;
      if (!less(items[child], item)) break;
      items[i] = items[child];
    }
    items[i] = item;
    return top;
  }
}

const less = (a, b) => a.cost < b.cost || (a.cost === b.cost && a.order < b.order);
