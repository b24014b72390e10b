import type { EstimateLimit, LimitState } from '../../../shared/schemas/estimate.js';
import type { CeilingAnswer, LimitAnswer, SolveAnswer } from '../../../shared/schemas/network-answers.js';
import type { LimitInfo } from '../assembly/builder.js';

/** exceeds: past the limit; tight: less margin than the rules ask; holds: all the margin that they ask. */
export function stateOf(margin: number, askedMargin: number): LimitState {
  if (margin < 0) return 'exceeds';
  return margin < askedMargin ? 'tight' : 'holds';
}

function headroomOf(scale: number | null | undefined, presentDrive: number): number | null {
  return scale === null || scale === undefined || presentDrive === 0 ? null : scale - 1;
}

/** The lesser of two headrooms; `null` is none within range. */
function lesser(a: number | null, b: number | null): number | null {
  if (a === null) return b;
  return b === null ? a : Math.min(a, b);
}

/**
 * One line per group of limits, in the order of first appearance: the member with least margin speaks for the group, with the
 * least headroom of all members.
 */
export function limitLines(
  infos: readonly LimitInfo[],
  answer: SolveAnswer,
  ceiling: CeilingAnswer,
  presentDrive: number,
): EstimateLimit[] {
  const answers = new Map<string, LimitAnswer>(answer.limits.map((limit) => [limit.id, limit]));
  const scales = new Map(ceiling.perLimit.map(({ id, scale }) => [id, scale]));
  const lines = new Map<string, EstimateLimit>();
  for (const info of infos) {
    const limit = answers.get(info.id);
    if (!limit) continue;
    const headroom = headroomOf(scales.get(info.id), presentDrive);
    const known = lines.get(info.group);
    if (known && known.margin <= limit.margin) {
      known.headroom = lesser(known.headroom, headroom);
      continue;
    }
    const second = limit.node === undefined ? undefined : answer.compared?.temperaturesC[limit.node];
    lines.set(info.group, {
      id: info.group,
      label: info.label,
      ...(limit.node === undefined ? {} : { node: limit.node }),
      ...(info.part === undefined ? {} : { part: info.part }),
      kind: info.kind,
      unit: info.unit,
      value: limit.value,
      limit: limit.limit,
      margin: limit.margin,
      askedMargin: info.askedMargin,
      state: stateOf(limit.margin, info.askedMargin),
      headroom: known ? lesser(known.headroom, headroom) : headroom,
      basis: info.basis,
      ...(info.kind === 'temperature' && second !== undefined ? { second } : {}),
    });
  }
  return [...lines.values()];
}

const stateOrder: Record<LimitState, number> = { exceeds: 0, tight: 1, holds: 2 };

/**
 * The limit that binds: least headroom. Limits that no drive within range reaches come last, among them those that are
 * exceeded or tight first, then the least margin relative to what is asked.
 */
export function bindingLine(lines: readonly EstimateLimit[]): EstimateLimit | undefined {
  return [...lines].sort((a, b) => {
    if (a.headroom !== null || b.headroom !== null) return (a.headroom ?? Infinity) - (b.headroom ?? Infinity);
    return stateOrder[a.state] - stateOrder[b.state] || a.margin - b.margin;
  })[0];
}

/** The worst state of all lines. */
export function worstState(lines: readonly EstimateLimit[]): LimitState {
  return lines.reduce<LimitState>(
    (worst, line) => (stateOrder[line.state] < stateOrder[worst] ? line.state : worst),
    'holds',
  );
}
