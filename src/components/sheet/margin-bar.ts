import type { EstimateLimit } from '../../../shared/schemas/estimate.js';

export interface MarginShares {
  /** Share of the way from the room to the limit that is used up; may pass 1. */
  used: number;
  /** Share of the way that the rules ask to leave free. */
  asked: number;
}

/** What the margin bar of a limit shows. Temperatures count from the room’s air, everything else from nothing. */
export function marginShares(limit: EstimateLimit, airC: number): MarginShares {
  const zero = limit.kind === 'temperature' ? Math.min(airC, limit.limit - 1) : 0;
  const whole = limit.limit - zero;
  if (!(whole > 0)) return { used: limit.margin < 0 ? 1 : 0, asked: 0 };
  return {
    used: Math.max((limit.value - zero) / whole, 0),
    asked: Math.min(Math.max(limit.askedMargin / whole, 0), 1),
  };
}
