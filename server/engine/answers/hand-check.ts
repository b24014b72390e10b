import { faceNames } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import type { SolveAnswer } from '../../../shared/schemas/network-answers.js';
import { boardConductivity } from '../conduction/board.js';
import { spreadingLeeSongAuMoran } from '../conduction/spreading.js';
import { groundOf } from '../assembly/compile-parts.js';
import type { BoxModel } from '../assembly/box.js';
import type { ResolvedAssembly, ResolvedPart } from '../assembly/resolved.js';

/** What natural convection and radiation together take from a small housing, common practice [W/(m² K)]. */
const handFilm = 10;

/** What is open to the room: the open faces of a box, or both sides of all carriers. */
function openSurfaces(assembly: ResolvedAssembly, box: BoxModel | null): { node: string; areaM2: number }[] {
  if (!box) {
    return assembly.carriers.map(({ id, at }) => ({
      node: `carrier.${id}.mean`,
      areaM2: 2 * at.sizeM[0] * at.sizeM[1],
    }));
  }
  return faceNames
    .filter((name) => ['open', 'near'].includes(box.models[name].face.exposure.kind))
    .map((name) => ({ node: `face.${name}.outer`, areaM2: box.models[name].outerAreaM2 }));
}

/**
 * The one-line check that anyone can do on paper: all the heat over the open outside at 10 W/(m² K).
 *
 * @param heatW all heat put into the network, sun included
 * @returns the rise by hand and the network’s mean rise of the open outside, both over the room’s air [K]
 */
export function handCheck(
  assembly: ResolvedAssembly,
  box: BoxModel | null,
  answer: SolveAnswer,
  airC: number,
): Estimate['handCheck'] {
  const open = openSurfaces(assembly, box);
  const areaM2 = open.reduce((sum, surface) => sum + surface.areaM2, 0);
  if (areaM2 === 0) {
    return { text: 'No face is open to the room: there is no hand check.', riseK: 0, networkRiseK: 0 };
  }
  const heatW = answer.heatBalance.inW - answer.heatBalance.lightOutW;
  const riseK = heatW / (handFilm * areaM2);
  const meanC =
    open.reduce((sum, { node, areaM2: area }) => sum + area * (answer.temperaturesC[node] ?? airC), 0) / areaM2;
  const networkRiseK = meanC - airC;
  const text =
    `${heatW.toFixed(1)} W over ${areaM2.toFixed(3)} m² of open outside at ${String(handFilm)} W/(m² K) gives ` +
    `${riseK.toFixed(1)} K; the network says ${networkRiseK.toFixed(1)} K for the mean of the outside, because its film ` +
    'coefficient follows from each face’s size, pose, finish and temperature.';
  const spreading = spreadingCheck(assembly, box, answer);
  return { text, riseK, networkRiseK, ...(spreading ? { spreading } : {}) };
}

/** What a part stands on, for the closed form: size, thickness, conductivities, and the mean of the side that it stands on. */
function groundFor(part: ResolvedPart, assembly: ResolvedAssembly, box: BoxModel | null, answer: SolveAnswer) {
  const { on } = part;
  if (on.kind === 'face') {
    const model = box?.models[on.face];
    const meanC = answer.temperaturesC[`face.${on.face}.mean`];
    return model && meanC !== undefined
      ? { areaM2: model.innerAreaM2, thickness: model.face.wallM, along: model.inPlane, through: model.through, meanC }
      : null;
  }
  const carrier = assembly.carriers.find(({ id }) => id === on.carrier);
  const meanC = answer.temperaturesC[`carrier.${on.carrier}.mean`];
  if (!carrier || meanC === undefined) return null;
  const { thickness, inPlane, through } = boardConductivity(
    carrier.layers.map(({ thicknessM, inPlaneWPerMK }) => ({
      conductivity: inPlaneWPerMK,
      thickness: thicknessM,
      coverage: 1,
    })),
  );
  return { areaM2: carrier.at.sizeM[0] * carrier.at.sizeM[1], thickness, along: inPlane, through, meanC };
}

/**
 * The hottest spot under a part by the closed form of Lee, Song, Au & Moran, as for one source in the middle: of the part whose spot stands
 * out most from the mean of what it stands on.
 */
function spreadingCheck(
  assembly: ResolvedAssembly,
  box: BoxModel | null,
  answer: SolveAnswer,
): NonNullable<Estimate['handCheck']['spreading']> | null {
  const spots = assembly.parts.flatMap((part) => {
    const ground = groundFor(part, assembly, box, answer);
    const peakC = answer.temperaturesC[groundOf(part).peak];
    return ground && peakC !== undefined ? [{ part, ground, networkRiseK: peakC - ground.meanC }] : [];
  });
  const worst = spots.reduce<(typeof spots)[number] | null>(
    (best, spot) => (best && best.networkRiseK >= spot.networkRiseK ? best : spot),
    null,
  );
  if (!worst || worst.networkRiseK <= 0) return null;
  const { part, ground, networkRiseK } = worst;
  const heatW = answer.flowsW[`${part.id}.joint`] ?? 0;
  const { peak } = spreadingLeeSongAuMoran({
    sourceArea: part.at.sizeM[0] * part.at.sizeM[1],
    plateArea: ground.areaM2,
    thickness: ground.thickness * Math.sqrt(ground.along / ground.through),
    conductivity: Math.sqrt(ground.along * ground.through),
    filmCoefficient: handFilm,
  });
  const riseK = heatW * peak;
  const text =
    `Under ${part.label} ${heatW.toFixed(1)} W spread by ${riseK.toFixed(1)} K from the mean of what it stands on to its hottest ` +
    `spot, by the closed form of Lee, Song, Au & Moran for a source in the middle; the cells say ${networkRiseK.toFixed(1)} K, ` +
    'because they know where it lies, what else warms it and what takes the heat away below.';
  return { text, riseK, networkRiseK };
}
