/** A function of one temperature: a flow and its slope. */
export type Curve = (temperature: number) => { value: number; slope: number };

/**
 * Largest relative jump of a curve’s value and of its slope between two temperatures [K]. Each of the steps is halved towards its greater change
 * until it is some 10⁻⁹ K wide: what is left there is a jump, for a smooth change shrinks with the step.
 */
export function largestJump(curve: Curve, fromK: number, toK: number, steps: number): { value: number; slope: number } {
  const worst = { value: 0, slope: 0 };
  for (const which of ['value', 'slope'] as const) {
    for (let i = 0; i < steps; i++) {
      let low = fromK + ((toK - fromK) * i) / steps;
      let high = fromK + ((toK - fromK) * (i + 1)) / steps;
      let atLow = curve(low)[which];
      let atHigh = curve(high)[which];
      while (high - low > 1e-9) {
        const middle = (low + high) / 2;
        const at = curve(middle)[which];
        if (Math.abs(at - atLow) > Math.abs(atHigh - at)) {
          high = middle;
          atHigh = at;
        } else {
          low = middle;
          atLow = at;
        }
      }
      const scale = Math.max(Math.abs(atLow), Math.abs(atHigh));
      if (scale > 0) worst[which] = Math.max(worst[which], Math.abs(atHigh - atLow) / scale);
    }
  }
  return worst;
}
