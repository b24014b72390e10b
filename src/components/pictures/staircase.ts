import type { Estimate } from '../../../shared/schemas/estimate.js';
import { kelvins } from '../../composables/numbers.js';

type Path = Estimate['paths'][number];

export interface Stair {
  node: string;
  label: string;
  short: string;
  temperatureC: number;
  limitC?: number;
  state: 'holds' | 'exceeds';
  x: number;
  w: number;
  y: number;
  /** Where the step’s value stands: above the step, or below it when its limit lies close above. */
  valueY: number;
  limitY: number | null;
  limitTextY: number | null;
  dropText: string;
  dropY: number;
}

const left = 46;
/** Room for a two-word name under the axis [px]. */
const nameWidth = 76;

/** Names short enough to stand under a step. */
export function shortName(node: string): string {
  if (node === 'ambient') return 'room air';
  if (node === 'surroundings') return 'surroundings';
  if (node === 'air.inside') return 'air inside';
  if (node === 'radiant.inside') return 'surfaces inside';
  if (node.endsWith('.junction')) return 'hottest spot';
  if (node.endsWith('.case')) return 'body';
  const [kind = '', name = '', spot = ''] = node.split('.');
  if (kind === 'face') return spot === 'outer' || spot === 'hotSpot' ? `${name}, out` : `${name}, in`;
  if (kind === 'carrier') return spot === 'peak' ? `${name}, under` : name;
  return node;
}

function niceStep(span: number): number {
  return [5, 10, 20, 25, 50, 100, 200, 500].find((step) => span / step <= 4) ?? 1000;
}

/** Where everything of the staircase stands [px]. */
export function staircase(path: Path, width: number, height: number) {
  const temperatures = path.steps.map((step) => step.temperatureC);
  const lowest = Math.min(...temperatures);
  const hottest = Math.max(...temperatures);
  // A limit far above would press the steps flat: those are left to the table.
  const ceiling = hottest + Math.max((hottest - lowest) * 0.8, 10);
  const limits = path.steps.flatMap(({ limitC }) => (limitC !== undefined && limitC <= ceiling ? [limitC] : []));
  const step = niceStep(Math.max(hottest, ...limits) - Math.min(lowest, ...limits));
  const low = Math.floor(Math.min(lowest, ...limits) / step) * step;
  const high = Math.ceil((Math.max(hottest, ...limits) + step * 0.15) / step) * step;
  const floor = height - 26;
  const top = 22;
  const yOf = (temperatureC: number) => floor - ((temperatureC - low) / (high - low)) * (floor - top);
  const w = (width - left - 8) / Math.max(path.steps.length, 1);
  const narrow = w < nameWidth;

  const steps = path.steps.map((entry, i): Stair => {
    const y = yOf(entry.temperatureC);
    const next = path.steps[i + 1];
    const drop = next ? entry.temperatureC - next.temperatureC : 0;
    const nextY = next ? yOf(next.temperatureC) : y;
    const shown = entry.limitC !== undefined && entry.limitC <= ceiling;
    const limitY = shown ? yOf(entry.limitC ?? 0) : null;
    const clashes = limitY !== null && limitY < y && y - limitY < 34;
    return {
      ...entry,
      short: shortName(entry.node),
      state: entry.limitC !== undefined && entry.temperatureC > entry.limitC ? 'exceeds' : 'holds',
      x: left + i * w,
      w,
      y,
      valueY: limitY !== null && limitY <= y && y - limitY < 20 ? y + 15 : y - 6,
      limitY,
      limitTextY: limitY === null ? null : clashes || limitY < top ? limitY - 5 : limitY > y ? limitY + 14 : limitY - 5,
      dropText: !narrow && nextY - y > 40 ? `${kelvins(drop)} K` : '',
      dropY: (y + nextY) / 2 - 2,
    };
  });
  const line = steps.map((s, i) => `${i === 0 ? 'M' : 'L'}${String(s.x)} ${String(s.y)}H${String(s.x + s.w)}`).join('');
  const count = Math.round((high - low) / step);
  return {
    width,
    floor,
    narrow,
    steps,
    line,
    ticks: Array.from({ length: count + 1 }, (_, i) => {
      const value = low + i * step;
      return { value, y: yOf(value), text: i === count ? `${String(value)} °C` : String(value) };
    }),
  };
}
