import type { ListQuery } from '../../shared/schemas/list.js';
import { invalid } from '../errors.js';

/**
 * The ORDER BY of a list.
 *
 * @param columns SQL by the name that the query calls it
 * @param standard what is sorted by without a wish, such as `-updatedAt`
 * @throws DomainError 422 at /sort for a name that the list does not have
 */
export function orderBy(sort: string | undefined, columns: Readonly<Record<string, string>>, standard: string): string {
  const wish = sort ?? standard;
  const name = wish.replace(/^-/, '');
  const column = Object.hasOwn(columns, name) ? columns[name] : undefined;
  if (column === undefined) {
    throw invalid([{ path: '/sort', message: `This list is sorted by one of: ${Object.keys(columns).join(', ')}` }]);
  }
  return `ORDER BY ${column} ${wish.startsWith('-') ? 'DESC' : 'ASC'} NULLS LAST`;
}

/** The pattern of ILIKE for text that is to be found as it is. */
export function containing(search: string): string {
  return `%${search.replace(/[\\%_]/g, '\\$&')}%`;
}

export function pageOf({ page, pageSize }: Pick<ListQuery, 'page' | 'pageSize'>): string {
  return `LIMIT ${String(pageSize)} OFFSET ${String((page - 1) * pageSize)}`;
}
