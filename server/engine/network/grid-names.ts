import type { GridSurface } from '../../../shared/schemas/network-grid.js';

/** Name under which the flow over an edge to a node is reported. */
export function edgeFlowId(grid: string, index: number, half: 'near' | 'far'): string {
  return `${grid}.edge.${String(index + 1)}.${half}`;
}

/** Name under which the flow over an edge into another grid is reported. */
export function edgeJoinFlowId(grid: string, index: number): string {
  return `${grid}.edge-join.${String(index + 1)}`;
}

/** Surfaces whose law gives one film coefficient for all their cells. */
export type FilmSurface = Exclude<GridSurface, { kind: 'radiation' | 'film' }>;

export function bringsFilm(surface: GridSurface): surface is FilmSurface {
  return surface.kind !== 'radiation' && surface.kind !== 'film';
}
