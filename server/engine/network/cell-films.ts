import type { System } from './link-arrays.js';
import type { FlowOut, LinkLaw } from './link-laws.js';
import type { Pairs } from './pairs.js';

/** Difference below which a cell’s own excess is rounded off, so that the mean excess has a slope everywhere [K]. */
const rounding = 1e-3;

/**
 * Convection of a gridded surface. A published correlation speaks of a surface as a whole, so one film coefficient stands for all its
 * cells, taken at their mean excess over the air, D = Σ w √((T − T_air)² + (1 mK)²); each cell then loses h A (T − T_air). Cells colder than
 * the air take the cold surface’s coefficient at the same D.
 *
 * D is a row of its own in the matrix, so that the matrix stays sparse and Newton’s method exact.
 */
export class CellFilm {
  /** Film coefficient as of the last evaluation [W/(m² K)], of the warmer cells where there are any. */
  film = 0;
  /** Mean excess D [K]. */
  excess = 0;
  readonly area: number;
  private readonly airHandles: number[];
  private readonly rowHandles: number[];
  private readonly airRowHandle: number;
  private cellAir: Int32Array = new Int32Array(0);
  private airCell: Int32Array = new Int32Array(0);
  private cellRow: Int32Array = new Int32Array(0);
  private rowCell: Int32Array = new Int32Array(0);
  private airRow = 0;
  private rowAir = 0;
  private readonly out: FlowOut = { flow: 0, byFrom: 0, byTo: 0, film: 0 };

  /**
   * @param law of one square metre
   * @param row number of the row of D
   */
  constructor(
    readonly id: string,
    readonly law: LinkLaw,
    readonly cells: Int32Array,
    readonly areas: Float64Array,
    readonly air: number,
    readonly row: number,
    pairs: Pairs,
  ) {
    this.area = areas.reduce((sum, area) => sum + area, 0);
    this.airHandles = Array.from(cells, (cell) => pairs.add(cell, air));
    this.rowHandles = Array.from(cells, (cell) => pairs.add(cell, row));
    this.airRowHandle = pairs.add(air, row);
  }

  bind(pairs: Pairs): void {
    this.cellAir = pairs.forwardSlots(this.airHandles);
    this.airCell = pairs.backwardSlots(this.airHandles);
    this.cellRow = pairs.forwardSlots(this.rowHandles);
    this.rowCell = pairs.backwardSlots(this.rowHandles);
    this.airRow = pairs.forward(this.airRowHandle);
    this.rowAir = pairs.backward(this.airRowHandle);
  }

  private meanExcess(temperatures: Float64Array): number {
    const { cells, areas } = this;
    const air = temperatures[this.air] as number;
    let sum = 0;
    for (let c = 0; c < cells.length; c++) {
      const d = (temperatures[cells[c] as number] as number) - air;
      sum += (areas[c] as number) * Math.sqrt(d * d + rounding * rounding);
    }
    return sum / this.area;
  }

  evaluate({ temperatures, residual, stiffness, matrix }: System): void {
    const { cells, areas, air, row, out, law } = this;
    const { diagonal, offDiagonal } = matrix;
    const airK = temperatures[air] as number;
    const excess = this.meanExcess(temperatures);
    this.excess = excess;
    // h, dh/dD and dh/dT_air at fixed D, of a surface warmer by D and of one colder by D.
    law.evaluate(airK + excess, airK, out);
    const hot = out.film;
    const hotByD = (out.byFrom - hot) / excess;
    const hotByAir = (out.byFrom + out.byTo) / excess;
    let cold = -1;
    let coldByD = 0;
    let coldByAir = 0;
    this.film = hot;
    let warmer = false;
    let rowByAir = 0;
    let onAir = 0;
    let airByAir = 0;
    let airByRow = 0;
    for (let c = 0; c < cells.length; c++) {
      const cell = cells[c] as number;
      const area = areas[c] as number;
      const d = (temperatures[cell] as number) - airK;
      let h = hot;
      let byD = hotByD;
      let byAir = hotByAir;
      if (d < 0) {
        if (cold < 0) {
          law.evaluate(airK - excess, airK, out);
          cold = out.film;
          coldByD = (out.byFrom - cold) / excess;
          coldByAir = -(out.byFrom + out.byTo) / excess;
        }
        h = cold;
        byD = coldByD;
        byAir = coldByAir;
      } else warmer = true;
      const g = h * area;
      const flow = g * d;
      residual[cell] = (residual[cell] as number) + flow;
      onAir -= flow;
      diagonal[cell] = (diagonal[cell] as number) + g;
      stiffness[cell] = (stiffness[cell] as number) + g;
      const bend = byAir * area * d;
      const slope = byD * area * d;
      const ca = this.cellAir[c] as number;
      offDiagonal[ca] = (offDiagonal[ca] as number) - g + bend;
      const ac = this.airCell[c] as number;
      offDiagonal[ac] = (offDiagonal[ac] as number) - g;
      offDiagonal[this.cellRow[c] as number] = slope;
      airByAir += g - bend;
      airByRow -= slope;
      const weight = (area / this.area) * (d / Math.sqrt(d * d + rounding * rounding));
      offDiagonal[this.rowCell[c] as number] = -weight;
      rowByAir += weight;
    }
    if (!warmer && cold >= 0) this.film = cold;
    residual[air] = (residual[air] as number) + onAir;
    diagonal[air] = (diagonal[air] as number) + airByAir;
    stiffness[air] = (stiffness[air] as number) + Math.abs(airByAir);
    offDiagonal[this.airRow] = (offDiagonal[this.airRow] as number) + airByRow;
    offDiagonal[this.rowAir] = rowByAir;
    diagonal[row] = 1;
  }

  /** As plain conductances near one temperature [K]. */
  linearise({ temperatures, residual, matrix }: System, kelvin: number): void {
    const { cells, areas, air } = this;
    const { diagonal, offDiagonal } = matrix;
    const film = this.law.guess(kelvin);
    for (let c = 0; c < cells.length; c++) {
      const cell = cells[c] as number;
      const g = film * (areas[c] as number);
      const flow = g * ((temperatures[cell] as number) - (temperatures[air] as number));
      residual[cell] = (residual[cell] as number) + flow;
      residual[air] = (residual[air] as number) - flow;
      diagonal[cell] = (diagonal[cell] as number) + g;
      diagonal[air] = (diagonal[air] as number) + g;
      offDiagonal[this.cellAir[c] as number] = (offDiagonal[this.cellAir[c] as number] as number) - g;
      offDiagonal[this.airCell[c] as number] = (offDiagonal[this.airCell[c] as number] as number) - g;
    }
    diagonal[this.row] = 1;
  }

  /** Heat from the surface to the air [W]. */
  flow(temperatures: Float64Array): number {
    const { cells, areas, air, out, law } = this;
    const airK = temperatures[air] as number;
    const excess = this.meanExcess(temperatures);
    law.evaluate(airK + excess, airK, out);
    const hot = out.film;
    law.evaluate(airK - excess, airK, out);
    const cold = out.film;
    let sum = 0;
    for (let c = 0; c < cells.length; c++) {
      const d = (temperatures[cells[c] as number] as number) - airK;
      sum += (d < 0 ? cold : hot) * (areas[c] as number) * d;
    }
    return sum;
  }
}
