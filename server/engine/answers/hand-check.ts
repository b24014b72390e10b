import { faceNames } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import type { SolveAnswer } from '../../../shared/schemas/network-answers.js';
import type { BoxModel } from '../assembly/box.js';
import type { ResolvedAssembly } from '../assembly/resolved.js';

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
  return { text, riseK, networkRiseK };
}
