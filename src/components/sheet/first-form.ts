import { readWallWords } from '../../../shared/housing-words.js';
import { readSize, type SizeReading } from '../../../shared/housing-words.js';
import type { UnitConverter } from '../../../shared/quantities.js';
import { mountings, seats, type FirstAnswers, type Mounting, type Seat } from '../../../shared/first-assembly.js';
import { contactTimes } from '../../../shared/schemas/rule-set.js';
import type { MaterialVersion } from '../../../shared/schemas/reference-lists.js';

/** The eight questions as they are typed; numbers may still be texts that could not be read. */
export interface FirstForm {
  name: string;
  size: string;
  material: string | null;
  walls: string;
  partType: string | null;
  heatW: number | string | null;
  currentA: number | string | null;
  mounting: string | null;
  seat: string | null;
  airC: number | string | null;
  altitudeM: number | string | null;
  touched: string | null;
  sun: string | null;
}

export function emptyForm(): FirstForm {
  return {
    name: '',
    size: '',
    material: null,
    walls: '',
    partType: null,
    heatW: null,
    currentA: null,
    mounting: null,
    seat: null,
    airC: null,
    altitudeM: null,
    touched: null,
    sun: null,
  };
}

/** A form kept in the browser; anything else is no form. */
export function formFrom(kept: string | null): FirstForm {
  try {
    const value: unknown = JSON.parse(kept ?? 'null');
    return typeof value === 'object' && value !== null ? { ...emptyForm(), ...value } : emptyForm();
  } catch {
    return emptyForm();
  }
}

const number = (value: number | string | null) => (typeof value === 'number' ? value : null);

function oneOf<T extends string>(allowed: readonly T[], value: string | null): T | null {
  return allowed.find((entry) => entry === value) ?? null;
}

export function sizeOf(form: FirstForm, converter: UnitConverter | undefined): SizeReading {
  return readSize(form.size, converter);
}

export function wallWords(form: FirstForm, materials: readonly MaterialVersion[]) {
  return readWallWords(
    form.walls,
    materials.map(({ version, content }) => ({
      version,
      slug: content.slug,
      name: content.name,
      group: content.group,
    })),
  );
}

/** What is known by now; whatever cannot be read counts as not known, so that an answer is never kept back. */
export function answersOf(
  form: FirstForm,
  materials: readonly MaterialVersion[],
  converter: UnitConverter | undefined,
): FirstAnswers {
  const size = sizeOf(form, converter);
  const words = wallWords(form, materials);
  const material = form.material ?? words.material?.version ?? null;
  const group = materials.find(({ version }) => version === material)?.content.group;
  // Without a word about it a wall counts as printed, unless it is of something that nobody prints.
  const printed =
    words.print !== null || (words.understood.length === 0 && (group === undefined || group === 'print-polymer'));
  return {
    name: form.name,
    sizeM: size.status === 'read' ? size.sizeM : null,
    material,
    wallM: words.wallM,
    print: words.print,
    printed: printed || (group === 'print-polymer' && !words.understood.includes('not printed')),
    partType: form.partType,
    currentA: number(form.currentA),
    heatW: number(form.heatW),
    mounting: oneOf<Mounting>(mountings, form.mounting),
    seat: oneOf<Seat>(seats, form.seat),
    airC: number(form.airC),
    altitudeM: number(form.altitudeM),
    touched: oneOf(['no', ...contactTimes] as const, form.touched),
    sun: oneOf(['none', 'window', 'full'] as const, form.sun),
  };
}

export const mountingChoices = [
  { value: 'standing', label: 'stands on a table or shelf' },
  { value: 'hanging', label: 'hangs free, air all round' },
  { value: 'back-against-wall', label: 'its back flat against a wall' },
  { value: 'top-against-ceiling', label: 'its top flat against a ceiling' },
];

export const seatChoices = [
  { value: 'board', label: 'a board on stand-offs' },
  { value: 'plate-top', label: 'an aluminium plate under the top' },
  { value: 'plate-bottom', label: 'an aluminium plate on the bottom' },
  { value: 'wall-top', label: 'straight on the top wall' },
  { value: 'wall-bottom', label: 'straight on the bottom wall' },
];

export const firstSunChoices = [
  { value: 'none', label: 'none' },
  { value: 'window', label: 'through a window' },
  { value: 'full', label: 'full sun' },
];
