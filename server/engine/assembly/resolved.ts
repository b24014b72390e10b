import type { AssemblyDocument, FaceName, Scenario } from '../../../shared/schemas/assembly.js';
import type { Material } from '../../../shared/schemas/material.js';
import type { PartType } from '../../../shared/schemas/part-type.js';
import type { ContactTime, LoadState } from '../../../shared/schemas/rule-set.js';
import type { PrintedWall } from '../conduction/printed-wall.js';
import type { Assumption } from './assumptions.js';

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
  open: boolean;
  loadState: LoadState;
}

/** A plate joined to a face, or a board above it. */
export interface ResolvedCarrier {
  id: string;
  path: string;
  kind: 'plate' | 'board';
  face: FaceName;
  sizeM: [number, number];
  thicknessM: number;
  inPlane: number;
  through: number;
  emissivity: number;
  capacityJPerK: number;
  polymer: boolean;
  /** Plates: joint to the face [K m²/W]. */
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
  jointKM2PerW: number;
  supply: string | null;
  count: number;
  arrangement: 'parallel' | 'series';
  heatW: number;
  lightKeptShare: number;
}

export interface ResolvedAssembly {
  document: AssemblyDocument;
  faces: Record<FaceName, ResolvedFace>;
  carriers: ResolvedCarrier[];
  parts: ResolvedPart[];
  touched: ContactTime | 'no';
  scenarios: (Scenario & { airC: number; surroundingsC: number })[];
  drive: { supply: string } | { parts: string[] };
  assumptions: Assumption[];
}
