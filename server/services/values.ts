import type { DataSource } from 'typeorm';
import { assemblyDocumentSchema, type AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { ListQuery } from '../../shared/schemas/list.js';
import { ruleSetSchema, type RuleSet } from '../../shared/schemas/rule-set.js';
import type { AppContext } from '../context.js';
import { invalid, notFound } from '../errors.js';
import type { FieldError } from '../engine/errors.js';
import { fieldErrors } from '../validation.js';
import { containing, orderBy, pageOf } from './listing.js';

export type ValueKind = 'material' | 'finish' | 'part-type' | 'rule-set';

export interface ValueRow {
  id: string;
  version: string;
  number: number;
  origin: 'reference';
  content: Record<string, unknown>;
}

const newest = `
  FROM reference_values v
  JOIN LATERAL (
    SELECT id, number, name, content FROM reference_value_versions
    WHERE value_id = v.id ORDER BY number DESC LIMIT 1
  ) n ON true
  WHERE v.kind = $1`;

const sortColumns: Record<string, string> = {
  name: 'lower(n.name)',
  slug: 'v.slug',
  group: `n.content->>'group'`,
  class: `n.content->>'class'`,
};

/** The values of one kind, newest versions, a page at a time. */
export async function listValues(
  { dataSource }: AppContext,
  kind: ValueKind,
  query: ListQuery,
): Promise<{ items: ValueRow[]; total: number; page: number }> {
  const order = orderBy(query.sort, sortColumns, 'name');
  const parameters: unknown[] = [kind];
  let where = newest;
  if (query.search) {
    parameters.push(containing(query.search));
    where += ` AND (n.name ILIKE $2 OR v.slug ILIKE $2 OR n.content->>'group' ILIKE $2 OR n.content->>'class' ILIKE $2)`;
  }
  const [{ count }] = await dataSource.query<[{ count: string }]>(`SELECT count(*) ${where}`, parameters);
  const items = await dataSource.query<Omit<ValueRow, 'origin'>[]>(
    `SELECT v.id, n.id AS version, n.number, n.content ${where} ${order}, v.slug ${pageOf(query)}`,
    parameters,
  );
  return { items: items.map((item) => ({ ...item, origin: 'reference' })), total: Number(count), page: query.page };
}

/** One value by its id or its slug. */
export async function getValue({ dataSource }: AppContext, kind: ValueKind, key: string): Promise<ValueRow> {
  const [row] = await dataSource.query<Omit<ValueRow, 'origin'>[]>(
    `SELECT v.id, n.id AS version, n.number, n.content ${newest} AND (v.id::text = $2 OR v.slug = $2)`,
    [kind, key],
  );
  if (!row) throw notFound(kind.replace('-', ' '));
  return { ...row, origin: 'reference' };
}

/** Contents of versions already read. Versions never change, so neither does this. */
const known = new Map<string, { kind: string; content: unknown }>();
const mostKnown = 20_000;

async function contentsOf(dataSource: DataSource, ids: readonly string[]): Promise<void> {
  const missing = ids.filter((id) => !known.has(id));
  if (missing.length === 0) return;
  const rows = await dataSource.query<{ id: string; kind: string; content: unknown }[]>(
    `SELECT n.id, v.kind, n.content FROM reference_value_versions n JOIN reference_values v ON v.id = n.value_id
     WHERE n.id = ANY($1::uuid[])`,
    [missing],
  );
  if (known.size + rows.length > mostKnown) known.clear();
  for (const { id, kind, content } of rows) known.set(id, { kind, content });
}

function isVersionRef(value: unknown): value is { version: string } {
  return (
    typeof value === 'object' &&
    value !== null &&
    Object.keys(value).length === 1 &&
    typeof (value as { version?: unknown }).version === 'string'
  );
}

function versionIds(value: unknown, found: Set<string>): void {
  if (isVersionRef(value)) found.add(value.version);
  else if (typeof value === 'object' && value !== null)
    for (const entry of Object.values(value)) versionIds(entry, found);
}

function replaceVersions(value: unknown, path: string, errors: FieldError[]): unknown {
  if (isVersionRef(value)) {
    const entry = known.get(value.version);
    if (entry) return { inline: entry.content };
    errors.push({ path: `${path}/version`, message: 'This value version is not known' });
    return value;
  }
  if (Array.isArray(value)) return value.map((entry, i) => replaceVersions(entry, `${path}/${String(i)}`, errors));
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, entry]) => [key, replaceVersions(entry, `${path}/${key}`, errors)]),
  );
}

/**
 * The document with every value version replaced by its content, ready for the engine.
 *
 * @throws DomainError 422 with the path of a version that is not known, or that is of another kind than its place wants
 */
export async function inlineDocument(
  { dataSource }: AppContext,
  document: AssemblyDocument,
  prefix = '',
): Promise<AssemblyDocument> {
  const ids = new Set<string>();
  versionIds(document, ids);
  await contentsOf(dataSource, [...ids]);
  const errors: FieldError[] = [];
  const inlined = replaceVersions(document, prefix, errors);
  if (errors.length > 0) throw invalid(errors);
  const parsed = assemblyDocumentSchema.safeParse(inlined);
  if (!parsed.success)
    throw invalid(asWrongKinds(fieldErrors(parsed.error)).map((e) => ({ ...e, path: prefix + e.path })));
  return parsed.data;
}

/** The document itself was valid, so what is wrong inside a value is that another kind stands there than is wanted. */
function asWrongKinds(errors: readonly FieldError[]): FieldError[] {
  const places = errors.map(({ path, message }) => {
    const [place, inside] = path.split('/inline');
    return inside === undefined
      ? { path, message }
      : { path: `${place ?? ''}/version`, message: 'This is another kind of value' };
  });
  return [...new Map(places.map((entry) => [entry.path, entry])).values()];
}

/** The rule set that is asked for, or the plain workshop set. */
export async function findRuleSet(
  context: AppContext,
  ref?: { version: string } | { inline: RuleSet },
): Promise<RuleSet> {
  if (ref && 'inline' in ref) return ref.inline;
  if (!ref) return ruleSetSchema.parse((await getValue(context, 'rule-set', 'plain-workshop')).content);
  await contentsOf(context.dataSource, [ref.version]);
  const entry = known.get(ref.version);
  if (entry?.kind !== 'rule-set') throw invalid([{ path: '/ruleSet/version', message: 'This rule set is not known' }]);
  return ruleSetSchema.parse(entry.content);
}
