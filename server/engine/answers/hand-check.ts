import { faceNames } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import type { SolveAnswer } from '../../../shared/schemas/network-answers.js';
import type { FaceModel } from '../assembly/compile-housing.js';

/** What natural convection and radiation together take from a small housing, common practice [W/(m² K)]. */
const handFilm = 10;

/**
 * The one-line check that anyone can do on paper: all the heat over the open outside at 10 W/(m² K).
 *
 * @param heatW all heat put into the network, sun included
 * @returns the rise by hand and the network’s mean rise of the open outside, both over the room’s air [K]
 */
export function handCheck(
  models: Record<(typeof faceNames)[number], FaceModel>,
  answer: SolveAnswer,
  airC: number,
): Estimate['handCheck'] {
  const open = faceNames.filter((name) => models[name].face.open);
  const areaM2 = open.reduce((sum, name) => sum + models[name].outerAreaM2, 0);
  if (areaM2 === 0) {
    return { text: 'No face is open to the room: there is no hand check.', riseK: 0, networkRiseK: 0 };
  }
  const heatW = answer.heatBalance.inW - answer.heatBalance.lightOutW;
  const riseK = heatW / (handFilm * areaM2);
  const meanC =
    open.reduce(
      (sum, name) => sum + models[name].outerAreaM2 * (answer.temperaturesC[`face.${name}.outer`] ?? airC),
      0,
    ) / areaM2;
  const networkRiseK = meanC - airC;
  const text =
    `${heatW.toFixed(1)} W over ${areaM2.toFixed(3)} m² of open outside at ${String(handFilm)} W/(m² K) gives ` +
    `${riseK.toFixed(1)} K; the network says ${networkRiseK.toFixed(1)} K for the mean of the outside, because its film ` +
    'coefficient follows from each face’s size, pose, finish and temperature.';
  return { text, riseK, networkRiseK };
}
