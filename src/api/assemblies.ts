import type { Assembly, AssemblySummary } from '../../shared/schemas/assembly-records.js';
import { queryOf, request } from './client.js';
import type { Page } from './values.js';

export interface AssemblyQuery {
  search?: string;
  sort?: string;
  page?: number;
  pageSize?: number;
  archived?: boolean;
}

export const fetchAssemblies = (query: AssemblyQuery, signal?: AbortSignal) =>
  request<Page<AssemblySummary>>('GET', `/assemblies${queryOf({ ...query })}`, { signal });
export const duplicateAssembly = (id: string, name: string) =>
  request<Assembly>('POST', `/assemblies/${id}/duplicate`, { body: { name } });
export const setArchived = (id: string, archived: boolean) =>
  request<Assembly>('POST', `/assemblies/${id}/${archived ? 'archive' : 'unarchive'}`);
