import type { FieldError } from '../errors.js';

/** Slack when sizes typed in millimetres are compared [m]. */
const slack = 1e-6;
/** Steps of the search for a free place, along each side. */
const searchSteps = 24;

export interface Rectangle {
  xM: number;
  yM: number;
  sizeM: readonly [number, number];
}

/** Something to be laid on a host: its size, and its position where it is known. */
export interface Item {
  path: string;
  /** Where it is told that it does not fit at all. */
  sizePath: string;
  label: string;
  sizeM: readonly [number, number];
  /** Of the near corner; `null`: to be found. */
  xM: number | null;
  yM: number | null;
}

export function overlap(a: Rectangle, b: Rectangle): boolean {
  return (
    Math.min(a.xM + a.sizeM[0], b.xM + b.sizeM[0]) - Math.max(a.xM, b.xM) > slack &&
    Math.min(a.yM + a.sizeM[1], b.yM + b.sizeM[1]) - Math.max(a.yM, b.yM) > slack
  );
}

function within(item: Rectangle, room: Rectangle): boolean {
  return (
    item.xM >= room.xM - slack &&
    item.yM >= room.yM - slack &&
    item.xM + item.sizeM[0] <= room.xM + room.sizeM[0] + slack &&
    item.yM + item.sizeM[1] <= room.yM + room.sizeM[1] + slack
  );
}

/** Pulls a rectangle that hangs over by rounding only back into its room. */
function pulledIn(item: Rectangle, room: Rectangle): Rectangle {
  const pull = (at: number, size: number, from: number, length: number) =>
    Math.max(Math.min(at, from + length - size), from);
  return {
    ...item,
    xM: pull(item.xM, item.sizeM[0], room.xM, room.sizeM[0]),
    yM: pull(item.yM, item.sizeM[1], room.yM, room.sizeM[1]),
  };
}

/** Turns a size by a quarter where it only fits so. */
function fitted(sizeM: readonly [number, number], room: readonly [number, number]): readonly [number, number] {
  const fits = sizeM[0] <= room[0] + slack && sizeM[1] <= room[1] + slack;
  const fitsTurned = sizeM[1] <= room[0] + slack && sizeM[0] <= room[1] + slack;
  return !fits && fitsTurned ? [sizeM[1], sizeM[0]] : sizeM;
}

/**
 * One rectangle for a bank of equal elements side by side, of the area of all of them.
 *
 * @returns size [m], or `null` where the bank does not fit
 */
export function bankSize(
  element: readonly [number, number],
  count: number,
  room: readonly [number, number],
): readonly [number, number] | null {
  let best: readonly [number, number] | null = null;
  for (let columns = 1; columns <= count; columns++) {
    const size = fitted([columns * element[0], (count / columns) * element[1]], room);
    if (size[0] > room[0] + slack || size[1] > room[1] + slack) continue;
    const shape = (s: readonly [number, number]) => Math.abs(Math.log(s[0] / s[1]));
    if (!best || shape(size) < shape(best)) best = size;
  }
  return best;
}

/** Even places for `count` things in a room: columns and rows as square as the room allows. */
function evenPlaces(count: number, room: Rectangle): { x: number; y: number }[] {
  const [lx, ly] = room.sizeM;
  const columns = Math.min(count, Math.max(1, Math.round(Math.sqrt((count * lx) / ly))));
  const rows = Math.ceil(count / columns);
  return Array.from({ length: count }, (_, i) => {
    const row = Math.floor(i / columns);
    const inRow = row === rows - 1 ? count - row * columns : columns;
    return {
      x: room.xM + (lx * ((i % columns) + 0.5)) / inRow,
      y: room.yM + (ly * (row + 0.5)) / rows,
    };
  });
}

function searchFree(sizeM: readonly [number, number], room: Rectangle, taken: readonly Rectangle[]): Rectangle | null {
  for (let j = 0; j <= searchSteps; j++) {
    for (let i = 0; i <= searchSteps; i++) {
      const candidate = {
        xM: room.xM + ((room.sizeM[0] - sizeM[0]) * i) / searchSteps,
        yM: room.yM + ((room.sizeM[1] - sizeM[1]) * j) / searchSteps,
        sizeM,
      };
      if (within(candidate, room) && !taken.some((other) => overlap(candidate, other))) return candidate;
    }
  }
  return null;
}

/**
 * Lays things on a host: those with a position where they are, the others spread evenly, or where there is room left.
 *
 * @param room the part of the host that may be used
 * @param where the host in the reader’s words
 * @param obstacles what lies there already
 * @returns a rectangle for each, and an error beside the field of each that does not fit or lies on another
 */
export function place(
  items: readonly Item[],
  room: Rectangle,
  where: string,
  obstacles: readonly Rectangle[] = [],
): { rectangles: Rectangle[]; errors: FieldError[] } {
  const errors: FieldError[] = [];
  const rectangles = new Array<Rectangle>(items.length);
  const taken = obstacles.map((rectangle) => ({ rectangle, label: 'a plate' }));
  items.forEach((item, i) => {
    if (item.xM === null || item.yM === null) return;
    const rectangle = { xM: item.xM, yM: item.yM, sizeM: item.sizeM };
    rectangles[i] = pulledIn(rectangle, room);
    if (!within(rectangle, room)) {
      const field =
        item.xM < room.xM - slack || item.xM + item.sizeM[0] > room.xM + room.sizeM[0] + slack ? 'xM' : 'yM';
      errors.push({ path: `${item.path}/${field}`, message: `${item.label} hangs over the edge of ${where}` });
      return;
    }
    const other = taken.find((entry) => overlap(entry.rectangle, rectangle));
    if (other) errors.push({ path: `${item.path}/xM`, message: `${item.label} lies over ${other.label}` });
    taken.push({ rectangle, label: item.label });
  });
  const open = items.flatMap((item, i) => (item.xM === null || item.yM === null ? [{ item, i }] : []));
  const places = evenPlaces(open.length, room);
  open.forEach(({ item, i }, n) => {
    const sizeM = fitted(item.sizeM, room.sizeM);
    const at = places[n] as { x: number; y: number };
    const even = pulledIn({ xM: item.xM ?? at.x - sizeM[0] / 2, yM: item.yM ?? at.y - sizeM[1] / 2, sizeM }, room);
    const others = taken.map(({ rectangle }) => rectangle);
    const fits = within(even, room) && !others.some((other) => overlap(even, other));
    const found = fits ? even : searchFree(sizeM, room, others);
    if (!found) errors.push({ path: item.sizePath, message: `${item.label} does not fit on ${where}` });
    rectangles[i] = found ?? even;
    taken.push({ rectangle: rectangles[i], label: item.label });
  });
  return { rectangles, errors };
}
