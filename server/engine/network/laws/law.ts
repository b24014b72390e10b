/** Where a link writes its flow q [W] and the partial derivatives of q [W/K] by the temperatures of its two ends. */
export interface FlowOut {
  flow: number;
  byFrom: number;
  byTo: number;
  /** Film coefficient [W/(m² K)] of a convective link. */
  film: number;
}

/** A link’s flow law: temperatures of both ends [K] in, flow and derivatives out. */
export interface LinkLaw {
  evaluate: (from: number, to: number, out: FlowOut) => void;
  /** A plain conductance [W/K] near the given temperature, for the first guess. */
  guess: (temperature: number) => number;
  /** Set where the law is linear: its conductance [W/K], 0 where it carries no heat. */
  conductance?: number;
  /** Set where the law is σ F (T₁⁴ − T₂⁴): F [m²]. */
  radiatingArea?: number;
  /** True for links with a film coefficient. */
  hasFilm?: boolean;
  /** What leaves a published range at these temperatures, in words. */
  outside?: (from: number, to: number) => string[];
}

class LinearLaw implements LinkLaw {
  constructor(readonly conductance: number) {}

  evaluate(from: number, to: number, out: FlowOut): void {
    out.flow = this.conductance * (from - to);
    out.byFrom = this.conductance;
    out.byTo = -this.conductance;
  }

  guess(): number {
    return this.conductance;
  }
}

export function linear(conductance: number): LinkLaw {
  return new LinearLaw(conductance);
}
