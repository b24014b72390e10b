import { createHash } from 'node:crypto';
import type { AppContext } from '../context.js';
import { DomainError } from '../errors.js';

/** Wrong passwords that lock an account, the time over which they count, and how long it is locked. */
export const mostFailures = 8;
const windowMs = 15 * 60_000;
const lockMs = 15 * 60_000;

/** Failures are kept by what was typed, whether or not there is such a person: both are locked alike. */
function keyOf(email: string): string {
  return createHash('sha256').update(email).digest('hex');
}

async function refuseWhileLocked({ dataSource, now }: AppContext, key: string): Promise<void> {
  const [row] = await dataSource.query<{ locked_until: Date | null }[]>(
    'SELECT locked_until FROM sign_in_failures WHERE email_key = $1',
    [key],
  );
  const left = (row?.locked_until?.getTime() ?? 0) - now().getTime();
  if (left <= 0) return;
  const minutes = Math.ceil(left / 60_000);
  throw new DomainError(
    429,
    'locked',
    `Too many wrong passwords for this address: try again in ${String(minutes)} min`,
    [],
    {},
    { 'Retry-After': String(Math.ceil(left / 1000)) },
  );
}

/** Counts a wrong password; one statement, so that guesses sent at once are all counted. */
async function countFailure({ dataSource, now }: AppContext, key: string): Promise<void> {
  const at = now();
  await dataSource.query(
    `INSERT INTO sign_in_failures AS f (email_key, failures, first_at, locked_until) VALUES ($1, 1, $2, NULL)
     ON CONFLICT (email_key) DO UPDATE SET
       failures = CASE WHEN f.first_at < $3 THEN 1 ELSE f.failures + 1 END,
       first_at = CASE WHEN f.first_at < $3 THEN $2 ELSE f.first_at END,
       locked_until = CASE WHEN f.first_at >= $3 AND f.failures + 1 >= $5 THEN $4::timestamptz ELSE f.locked_until END`,
    [key, at, new Date(at.getTime() - windowMs), new Date(at.getTime() + lockMs), mostFailures],
  );
}

/**
 * Runs one check of a password under the account’s lock. A right guess that was sent beside many wrong ones is told
 * nothing once these have locked the account.
 *
 * @returns whether the password fits
 * @throws DomainError 429 with Retry-After while the account is locked
 */
export async function guarded(context: AppContext, email: string, check: () => Promise<boolean>): Promise<boolean> {
  const key = keyOf(email);
  await refuseWhileLocked(context, key);
  const fits = await check();
  if (!fits) await countFailure(context, key);
  await refuseWhileLocked(context, key);
  if (fits) await context.dataSource.query('DELETE FROM sign_in_failures WHERE email_key = $1', [key]);
  return fits;
}
