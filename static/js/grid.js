// Places: from the pointer to the grid and back, and what lies at a place.

export const sheet = document.getElementById('sheet');
export const overlay = document.getElementById('overlay');

export const step = Number(sheet.dataset.step);
const [originX, originY] = sheet.dataset.origin.split(' ').map(Number);

overlay.setAttribute('viewBox', sheet.getAttribute('viewBox'));

/** User units of a grid place. */
export const userX = x => originX + x * step;
export const userY = y => originY + y * step;

/** The place under the pointer in grid steps, not rounded. @param {{clientX: number, clientY: number}} event */
export function placeOf(event) {
  const at = new DOMPoint(event.clientX, event.clientY).matrixTransform(sheet.getScreenCTM().inverse());
  return [(at.x - originX) / step, (at.y - originY) / step];
}

/** The nearest grid point. */
export const nearest = ([x, y]) => [Math.round(x), Math.round(y)];

/** Where a grid place is in the window. */
export function clientOf([x, y]) {
  const at = new DOMPoint(userX(x), userY(y)).matrixTransform(sheet.getScreenCTM());
  return [at.x, at.y];
}

/** Every pin on the sheet. @returns {{name: string, at: number[]}[]} */
export function pins() {
  return [...sheet.querySelectorAll('[data-pin]')].map(circle => ({ name: circle.dataset.pin, at: pinPlace(circle) }));
}

/** @param {Element} circle a pin's element */
export function pinPlace(circle) {
  return [Math.round((Number(circle.getAttribute('cx')) - originX) / step), Math.round((Number(circle.getAttribute('cy')) - originY) / step)];
}

/** The places of a wire, from the points that its element carries. */
export function wirePoints(group) {
  return group.dataset.points.split(' ').map(pair => pair.split(',').map(Number));
}

/** All straight stretches of wire. @returns {{wire: string, from: number[], to: number[]}[]} */
export function stretches() {
  const list = [];
  for (const group of sheet.querySelectorAll('[data-wire]')) {
    const points = wirePoints(group);
    for (let i = 1; i < points.length; i++) list.push({ wire: group.dataset.wire, from: points[i - 1], to: points[i] });
  }
  return list;
}

/** Whether a place lies on a stretch. */
export const liesOn = ([x, y], { from, to }) =>
  x >= Math.min(from[0], to[0]) && x <= Math.max(from[0], to[0]) && y >= Math.min(from[1], to[1]) && y <= Math.max(from[1], to[1]);

/** The pin at a grid place, if any. */
export const pinAt = place => pins().find(pin => pin.at[0] === place[0] && pin.at[1] === place[1]);

/** Whether something is there to join: a pin or a wire. */
export const joinsAt = place => Boolean(pinAt(place)) || stretches().some(stretch => liesOn(place, stretch));

const xmlns = 'http://www.w3.org/2000/svg';

/** Makes an SVG element. */
export function svg(name, attributes, ...children) {
  const element = document.createElementNS(xmlns, name);
  for (const [key, value] of Object.entries(attributes)) element.setAttribute(key, value);
  element.append(...children);
  return element;
}
