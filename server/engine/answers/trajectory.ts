import type { Drive } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import { EngineError } from '../errors.js';
import { limitReader, type LimitReader } from '../network/answer.js';
import { solveSteady, startFrom, tangent } from '../network/newton.js';
import { PreparedNetwork } from '../network/prepared.js';
import { driveSetter } from './drive.js';

/** Numbers that a limit is read from, at most: its value and what it is held against. */
const perLimit = 2;
/** In a network of more unknowns than this the states along the way are solved so much less exactly: to about 10⁻⁷ K. */
export const large = 250;
const looser = 1e3;
/** Share of a drive by which the slopes along the tangent are taken. */
const nudge = 1e-4;

/** A solved drive: what every limit is read from, with its slope by the drive. */
interface Point {
  scale: number;
  values: Float64Array;
  slopes: Float64Array;
  temperatures: Float64Array;
  /** dT/dscale [K]. */
  towards: Float64Array;
}

/**
 * The states of a network along its drive. Each solved drive also yields the tangent (one more solution with the matrix at hand), so that
 * between two of them every limit follows a cubic that meets value and slope at both ends, and the next drive starts from a foretold state.
 */
export class Trajectory {
  readonly network: PreparedNetwork;
  readonly readers: readonly LimitReader[];
  readonly points: Point[] = [];
  private readonly setDrive: (scale: number) => void;
  private readonly step: Float64Array;
  private readonly start: Float64Array;

  /** @param near a like network to start from; without it a first guess is made */
  constructor(document: NetworkDocument, drive: Drive, near?: PreparedNetwork) {
    this.network = new PreparedNetwork(document);
    this.setDrive = driveSetter(this.network, drive);
    this.readers = document.limits.map((limit) => limitReader(this.network, limit));
    this.step = new Float64Array(this.network.rows);
    if (!near) this.setDrive(0);
    startFrom(this.network, near);
    this.start = Float64Array.from(this.network.temperatures);
  }

  /** Solves at a drive and keeps the point; `null` where there is no steady state. */
  solve(scale: number): Point | null {
    if (!this.settle(scale)) return null;
    const { network } = this;
    const point: Point = {
      scale,
      values: this.read(),
      slopes: new Float64Array(perLimit * this.readers.length),
      temperatures: Float64Array.from(network.temperatures),
      towards: new Float64Array(network.unknownCount),
    };
    this.addSlopes(point);
    const at = this.points.findIndex((other) => other.scale > scale);
    this.points.splice(at < 0 ? this.points.length : at, 0, point);
    return point;
  }

  /** Brings the network to its steady state at a drive, from the nearest state known; false where there is none. */
  settle(scale: number): boolean {
    const { network } = this;
    this.setDrive(scale);
    const from = this.points.reduce<Point | null>(
      (best, point) => (!best || Math.abs(point.scale - scale) < Math.abs(best.scale - scale) ? point : best),
      null,
    );
    network.temperatures.set(from?.temperatures ?? this.start);
    if (from) {
      const ahead = scale - from.scale;
      // A tangent is worth following no further than the drive itself.
      if (Math.abs(ahead) <= Math.max(from.scale, scale)) {
        for (let i = 0; i < network.unknownCount; i++) {
          const moved = (from.temperatures[i] as number) + ahead * (from.towards[i] as number);
          network.temperatures[i] = Math.min(Math.max(moved, 30), 1490);
        }
        network.project();
      }
    }
    try {
      solveSteady(network, network.unknownCount > large ? looser : 1);
      return true;
    } catch (error) {
      const none = ['runaway', 'not-converged', 'outside-range'];
      if (error instanceof EngineError && none.includes(error.code)) return false;
      throw error;
    }
  }

  private read(): Float64Array {
    const values = new Float64Array(perLimit * this.readers.length);
    this.readers.forEach((reader, i) => {
      reader.read(values, perLimit * i);
    });
    return values;
  }

  /** Slopes of what is read, by a small step along the tangent. */
  private addSlopes(point: Point): void {
    const { network, step } = this;
    const by = nudge * Math.max(point.scale, nudge);
    tangent(
      network,
      () => {
        this.setDrive(point.scale + by);
      },
      by,
      step,
    );
    for (let i = 0; i < network.unknownCount; i++) {
      point.towards[i] = step[i] as number;
      network.temperatures[i] = (point.temperatures[i] as number) + by * (step[i] as number);
    }
    network.project();
    network.evaluate();
    const ahead = this.read();
    for (let i = 0; i < ahead.length; i++) point.slopes[i] = ((ahead[i] as number) - (point.values[i] as number)) / by;
    network.temperatures.set(point.temperatures);
    this.setDrive(point.scale);
  }

  /** Excess of a limit at a drive between two neighbouring points, by the cubic through both. */
  excessBetween(limit: number, a: Point, b: Point, scale: number): number {
    const width = b.scale - a.scale;
    const u = (scale - a.scale) / width;
    const cubic = (q: number) => {
      const y0 = a.values[q] as number;
      const y1 = b.values[q] as number;
      const s0 = (a.slopes[q] as number) * width;
      const s1 = (b.slopes[q] as number) * width;
      const rise = y1 - y0;
      return y0 + u * (s0 + u * (3 * rise - 2 * s0 - s1 + u * (s0 + s1 - 2 * rise)));
    };
    return (this.readers[limit] as LimitReader).excess(cubic(perLimit * limit), cubic(perLimit * limit + 1));
  }

  excessAt(limit: number, point: Point): number {
    const q = perLimit * limit;
    return (this.readers[limit] as LimitReader).excess(point.values[q] as number, point.values[q + 1] as number);
  }
}

export type { Point };
