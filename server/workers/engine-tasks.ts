import type { AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { Estimate } from '../../shared/schemas/estimate.js';
import type { NetworkDocument } from '../../shared/schemas/network.js';
import type { CeilingAnswer, CeilingRequest, SolveAnswer, Warning } from '../../shared/schemas/network-answers.js';
import type { RuleSet } from '../../shared/schemas/rule-set.js';
import type { EngineErrorCode, FieldError } from '../engine/errors.js';

/** What a worker can be asked, and what it answers. */
export interface EngineTasks {
  solve: { input: { document: NetworkDocument; compare: boolean }; output: SolveAnswer };
  ceiling: { input: CeilingRequest; output: CeilingAnswer };
  estimate: { input: { document: AssemblyDocument; rules: RuleSet; scenario?: string | undefined }; output: Estimate };
  /** One estimate in full per scenario. */
  estimateAll: { input: { document: AssemblyDocument; rules: RuleSet }; output: Estimate[] };
  compile: {
    input: { document: AssemblyDocument; rules: RuleSet };
    output: { networks: { scenario: string; network: NetworkDocument }[]; warnings: Warning[] };
  };
}

export type EngineTaskName = keyof EngineTasks;

/** Errors lose their class between threads, so they travel as data. */
export type TaskAnswer<T> =
  { ok: true; value: T } | { ok: false; error: { code: EngineErrorCode; message: string; errors: FieldError[] } };
