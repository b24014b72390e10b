import type {
  FinishVersion,
  MaterialVersion,
  PartTypeVersion,
  RuleSetVersion,
} from '../../shared/schemas/reference-lists.js';
import { request } from './client.js';

export interface Page<T> {
  items: T[];
  total: number;
  page: number;
}

/** The tables fit one page; they are searched in the browser. */
const all = '?pageSize=500';

export const fetchMaterials = () => request<Page<MaterialVersion>>('GET', `/materials${all}`);
export const fetchFinishes = () => request<Page<FinishVersion>>('GET', `/finishes${all}`);
export const fetchPartTypes = () => request<Page<PartTypeVersion>>('GET', `/parts${all}`);
export const fetchRuleSets = () => request<Page<RuleSetVersion>>('GET', `/rule-sets${all}`);
