/** Median, 95th percentile and worst of measured times [ms], as one line. */
export function spreadOf(timesMs: readonly number[], digits: number): string {
  const sorted = [...timesMs].sort((a, b) => a - b);
  const at = (share: number) =>
    (sorted[Math.min(Math.floor(sorted.length * share), sorted.length - 1)] ?? NaN).toFixed(digits);
  return `median ${at(0.5)} ms, p95 ${at(0.95)} ms, worst ${at(1)} ms (${String(sorted.length)} times)`;
}
