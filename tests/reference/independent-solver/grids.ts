import type { NetworkDocument } from '../../../shared/schemas/network.js';
import { networkDocumentSchema } from '../../../shared/schemas/network.js';
import type { PlateCase } from './python.js';

/** The plate of a finite-volume case as a grid of the engine: films on both sides to a room at 0 °C. */
export function gridOf(plate: PlateCase, refine = 1): NetworkDocument {
  const bare = plate.hNear > 0;
  return networkDocumentSchema.parse({
    format: 'trimwick-network/1',
    nodes: [
      { id: 'room', fixedC: 0 },
      ...plate.sources.map(({ heat }, i) => ({ id: `source.${String(i)}`, heatW: heat })),
    ],
    grids: [
      {
        id: 'plate',
        sizeM: [plate.lx, plate.ly],
        layers: [{ thicknessM: plate.t, inPlaneWPerMK: plate.kxy, throughWPerMK: plate.kz }],
        filmForCellsWPerM2K: plate.hNear + plate.hFar,
        refine,
        patches: plate.sources.map(({ x0, y0, lx, ly }, i) => ({
          node: `source.${String(i)}`,
          side: 'near',
          xM: x0,
          yM: y0,
          sizeM: [lx, ly],
        })),
        surfaces: [
          { id: 'far', side: 'far', to: 'room', kind: 'film', coefficientWPerM2K: plate.hFar },
          ...(bare ? [{ id: 'near', side: 'near', to: 'room', kind: 'film', coefficientWPerM2K: plate.hNear }] : []),
        ],
        readings: [
          ...plate.sources.map(({ x0, y0, lx, ly }, i) => ({
            id: `peak.${String(i)}`,
            side: 'near',
            what: 'peak',
            over: { xM: x0, yM: y0, sizeM: [lx, ly] },
          })),
          { id: 'near.mean', side: 'near', what: 'mean' },
          { id: 'far.mean', side: 'far', what: 'mean' },
          { id: 'far.peak', side: 'far', what: 'peak' },
        ],
      },
    ],
  });
}
