import type {
  AssemblyDocument,
  Exposure,
  FaceName,
  Housing,
  Lead,
  Scenario,
} from '../../../shared/schemas/assembly.js';
import type { Material } from '../../../shared/schemas/material.js';
import type { GridLayer } from '../../../shared/schemas/network-grid.js';
import type { PartType } from '../../../shared/schemas/part-type.js';
import type { ContactTime, LoadState } from '../../../shared/schemas/rule-set.js';
import type { PrintedWall } from '../conduction/printed-wall.js';
import type { Assumption } from './assumptions.js';
import type { Rectangle } from './placing.js';
import type { Vector } from './pose.js';

/** A face with every value known. SI units. */
export interface ResolvedFace {
  name: FaceName;
  path: string;
  wallM: number;
  material: Material;
  /** `null`: solid. */
  printed: PrintedWall | null;
  emissivityOutside: number;
  emissivityInside: number;
  solarAbsorptance: number;
  exposure: Exposure;
  loadState: LoadState;
}

export type Faces = Record<FaceName, ResolvedFace>;

export interface Fins {
  heightM: number;
  thicknessM: number;
  count: number;
  along: 'x' | 'y';
  conductivity: number;
}

/** A plate joined to a face, a board above it, a base with fins outside of it; or any of them in the open. */
export interface ResolvedCarrier {
  id: string;
  path: string;
  kind: 'plate' | 'board' | 'fins';
  /** `null`: in the open. */
  face: FaceName | null;
  /** Where it lies on its face, in the face’s own plane; in the open at 0, 0. */
  at: Rectangle;
  thicknessM: number;
  /** From the side of the parts to the other. */
  layers: GridLayer[];
  zones: (Rectangle & { layers: GridLayer[] })[];
  fins: Fins | null;
  facing: 'up' | 'down' | 'sideways';
  emissivity: number;
  polymer: boolean;
  /** Plates and fins: joint to the face [K m²/W]. */
  jointKM2PerW: number;
  /** Boards: distance to the face [m]; 0 for a plate. */
  standOffM: number;
}

export interface ResolvedPart {
  id: string;
  path: string;
  label: string;
  type: PartType;
  on: { kind: 'face'; face: FaceName } | { kind: 'carrier'; carrier: string };
  /** What it covers of what it stands on. */
  at: Rectangle;
  jointKM2PerW: number;
  supply: string | null;
  count: number;
  arrangement: 'parallel' | 'series';
  heatW: number;
  lightKeptShare: number;
}

export interface ResolvedLead extends Lead {
  path: string;
  label: string;
}

export type ResolvedScenario = Scenario & {
  path: string;
  airC: number;
  surroundingsC: number;
  /** Which way is up, in the box’s own axes. */
  up: Vector;
};

export interface ResolvedAssembly {
  document: AssemblyDocument;
  /** `null`: an open assembly. */
  box: { housing: Housing; faces: Faces } | null;
  carriers: ResolvedCarrier[];
  parts: ResolvedPart[];
  leads: ResolvedLead[];
  touched: ContactTime | 'no';
  scenarios: ResolvedScenario[];
  drive: { supply: string } | { parts: string[] };
  assumptions: Assumption[];
}
