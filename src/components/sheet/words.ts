import type { FaceName } from '../../../shared/schemas/assembly.js';
import type { Choice } from './choice.js';

/** The words of the sheet’s choices. */

export const faceChoices: Choice[] = (['top', 'bottom', 'front', 'back', 'left', 'right'] satisfies FaceName[]).map(
  (face) => ({ value: face, label: face }),
);

export const loadChoices: Choice[] = [
  { value: 'free', label: 'free: carries nothing' },
  { value: 'self-weight', label: 'its own weight' },
  { value: 'snap', label: 'snap fit' },
  { value: 'screw-clamped', label: 'clamped by screws' },
  { value: 'structural', label: 'structural: carries the product' },
];

export const touchChoices: Choice[] = [
  { value: 'no', label: 'out of reach' },
  { value: '1 s', label: 'brushed, up to 1 s' },
  { value: '10 s', label: 'handled, up to 10 s' },
  { value: '1 min', label: 'held, up to 1 min' },
  { value: '10 min', label: 'held, up to 10 min' },
  { value: '8 h', label: 'carried or worn, up to 8 h' },
];

export const exposureChoices: Choice[] = [
  { value: 'open', label: 'open to the room' },
  { value: 'against-wall', label: 'held flat against something' },
  { value: 'gap', label: 'before a surface, across a closed gap of air' },
  { value: 'near', label: 'open, near a warm or cold surface' },
  { value: 'covered', label: 'covered by cloth or dust' },
];

export const patternChoices: Choice[] = [
  { value: 'cells', label: 'cells' },
  { value: 'ribs', label: 'ribs from wall to wall' },
];

export const arrangementChoices: Choice[] = [
  { value: 'parallel', label: 'in parallel' },
  { value: 'series', label: 'in series' },
];

export const sunChoices: Choice[] = [
  { value: 'worst', label: 'the face that takes up most' },
  ...faceChoices.map(({ value, label }) => ({ value, label: `the ${label} face` })),
];

export const facingChoices: Choice[] = [
  { value: 'up', label: 'up' },
  { value: 'down', label: 'down' },
  { value: 'sideways', label: 'sideways, upright' },
];

export const fillChoices: Choice[] = [
  { value: 'air', label: 'air' },
  { value: 'potting', label: 'potting, to a height' },
  { value: 'foam', label: 'foam, all of it' },
];

export const fanChoices: Choice[] = [
  { value: 'none', label: 'none' },
  { value: 'flow', label: 'a given flow' },
  { value: 'curve', label: 'a fan with its curve' },
];

export const finChoices: Choice[] = [
  { value: 'x', label: 'the length' },
  { value: 'y', label: 'the width' },
];
