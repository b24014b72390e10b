/** What the net says of one face. */
export interface NetFace {
  /** Short lines under the name: wall, material. */
  lines: string[];
  temperatureC: number | null;
  colour: string | null;
  /** Held against something, and takes no part in the cooling. */
  against: boolean;
  /** Openings. */
  vents: number;
  wrong: boolean;
}
